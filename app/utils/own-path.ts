/**
 * The address to go to after signing in, or `/bench` where it could lead off this site: only a path
 * that begins with exactly one `/` stays ours. Browsers read `\` as `/` and drop tabs and line ends,
 * so both are refused.
 */
export function ownPath(wish: unknown): string {
  if (typeof wish !== 'string' || !wish.startsWith('/') || wish.startsWith('//')) return '/bench'
  if ([...wish].some(character => character === '\\' || character < ' ' || character === '\u007f')) return '/bench'
  const path = wish.split(/[?#]/, 1)[0]!
  if (path === '/sign-in') return '/bench'
  return wish
}
