export const THEMES = ['system', 'light', 'dark'] as const
export type Theme = (typeof THEMES)[number]

/** The person's choice, in a cookie so that the server already draws the right one. */
export function useTheme() {
  return useCookie<Theme>('coldslip-theme', {
    default: () => 'system',
    decode: text => THEMES.find(theme => theme === text) ?? 'system',
    encode: theme => theme,
    maxAge: 60 * 60 * 24 * 365,
    sameSite: 'lax',
    path: '/',
  })
}
