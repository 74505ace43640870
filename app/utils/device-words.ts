const SYSTEMS: readonly [RegExp, string][] = [[/iPad/, 'iPad'], [/iPhone/, 'iPhone'], [/Android/, 'Android'], [/Windows/, 'Windows'], [/Mac OS X|Macintosh/, 'Mac'], [/CrOS/, 'ChromeOS'], [/Linux|X11/, 'Linux']]
const BROWSERS: readonly [RegExp, string][] = [[/Edg\//, 'Edge'], [/Firefox\//, 'Firefox'], [/Chrom(e|ium)\//, 'Chrome'], [/Safari\//, 'Safari']]

/** `Chrome on Windows` from what a browser says of itself; a program is shown as it calls itself. */
export function deviceWords(userAgent: string): string {
  const browser = BROWSERS.find(([pattern]) => pattern.test(userAgent))?.[1]
  const system = SYSTEMS.find(([pattern]) => pattern.test(userAgent))?.[1]
  if (browser && system) return `${browser} on ${system}`
  return browser ?? system ?? (userAgent.slice(0, 40) || 'A program without a name')
}
