// Runs on any Node that knows modules, so that an old one gets a sentence and not a syntax error.

/** What Nuxt 4.4 asks for (its package's `engines`). */
export const WANTED = '20.19 or newer (but not 21), or 22.12 or newer'

/** @param {string} version for example `20.19.0` */
export function nodeIsSupported(version) {
  const parts = version.split('.').map(Number)
  const major = parts[0]
  const minor = parts[1]
  if (major === 20) return minor >= 19
  if (major === 22) return minor >= 12
  return major > 22
}

export function checkNodeVersion() {
  if (nodeIsSupported(process.versions.node)) return
  process.stderr.write('Coldslip needs Node ' + WANTED + '; this is Node ' + process.versions.node + ' (' + process.execPath + ').\n')
  process.exit(1)
}
