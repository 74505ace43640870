import { createHash } from 'node:crypto'
import { existsSync, readFileSync, writeFileSync } from 'node:fs'
import { join } from 'node:path'
import { PlainError } from './plain-error.mjs'
import { step } from './progress.mjs'
import { run, tail } from './run.mjs'

/** The environment for npm and what it starts: with NODE_ENV=production it would leave out what the build needs. */
export function npmEnvironment() {
  const env = { ...process.env }
  delete env.NODE_ENV
  // npm hands its own settings down to its scripts; an outer `--omit=dev` must not reach the inner npm.
  for (const name of Object.keys(env)) if (/^npm_config_(omit|production|only|include|dry_run)$/i.test(name)) delete env[name]
  return env
}

/** Installs the packages of package-lock.json unless the very same ones are there already. */
export async function ensurePackages(root) {
  const stamp = join(root, 'node_modules/.coldslip-lock')
  const digest = createHash('sha256').update(readFileSync(join(root, 'package-lock.json'))).digest('hex')
  if (existsSync(stamp) && readFileSync(stamp, 'utf8') === digest) return
  await step('Installing packages', async () => {
    const { code, output } = await run('npm', ['ci', '--include=dev', '--no-fund', '--no-audit'], { cwd: root, env: npmEnvironment() })
    if (code === 127) throw new PlainError('npm was not found; install it together with Node 20.')
    if (code !== 0) throw new PlainError(`npm ci failed:\n${tail(output)}`)
  })
  writeFileSync(stamp, digest)
}
