import { PlainError } from './plain-error.mjs'
import { step } from './progress.mjs'
import { run, tail } from './run.mjs'

let listsAreFresh = false

/**
 * Installs Debian packages, or says which command does.
 *
 * @param {string} what what is missing, for the message
 * @param {string[]} packages
 */
export async function installDebianPackages(what, packages) {
  const command = `apt-get install -y --no-install-recommends ${packages.join(' ')}`
  if ((await run('apt-get', ['--version'])).code !== 0) throw new PlainError(`${what} is missing; install it with your system's package manager, then start again.`)
  if (process.getuid() !== 0) throw new PlainError(`${what} is missing; install it with this command, then start again: sudo sh -c 'apt-get update && ${command}'`)
  const env = { ...process.env, DEBIAN_FRONTEND: 'noninteractive', LC_ALL: 'C' }
  const lock = ['-o', 'DPkg::Lock::Timeout=300']
  if (!listsAreFresh) {
    // Not decisive: with lists of yesterday the installation may still work, and says so itself if not.
    await step('Reading the list of Debian packages', () => run('apt-get', [...lock, 'update'], { env }))
    listsAreFresh = true
  }
  await step(`Installing ${what} (${packages.join(', ')})`, async () => {
    const { code, output } = await run('apt-get', [...lock, ...command.split(' ').slice(1)], { env })
    if (code !== 0) throw new PlainError(`${what} could not be installed with "${command}":\n${tail(output, 12)}`)
  })
}
