import { createHash } from 'node:crypto'
import { existsSync, mkdirSync, readdirSync, readFileSync, statSync, writeFileSync } from 'node:fs'
import { join } from 'node:path'
import { npmEnvironment } from './packages.mjs'
import { PlainError } from './plain-error.mjs'
import { step } from './progress.mjs'
import { run, tail } from './run.mjs'

/** Everything that the build reads. Commands and migrations run from the source tree and are no part of it. */
const SOURCES = ['app', 'server', 'shared', 'public', 'nuxt.config.ts', 'tailwind.config.ts', 'package.json', 'package-lock.json']
const NOT_BUILT = ['server/commands', 'server/database/migrations']

function* filesUnder(root, path) {
  const full = join(root, path)
  if (!existsSync(full) || NOT_BUILT.includes(path)) return
  if (!statSync(full).isDirectory()) {
    yield path
    return
  }
  for (const name of readdirSync(full).sort()) yield* filesUnder(root, `${path}/${name}`)
}

/** @returns {string} hex digest over names and contents of all sources, and over the Node version */
export function sourceDigest(root) {
  const digest = createHash('sha256').update(process.version)
  for (const source of SOURCES) {
    for (const file of filesUnder(root, source)) digest.update(`\0${file}\0`).update(readFileSync(join(root, file)))
  }
  return digest.digest('hex')
}

/**
 * Builds `.output` unless it was made from these very sources.
 *
 * @param {string} root
 * @param {string} logFolder where build.log goes
 */
export async function ensureBuild(root, logFolder) {
  const stamp = join(root, '.output/.source-digest')
  const digest = sourceDigest(root)
  if (existsSync(stamp) && existsSync(join(root, '.output/server/index.mjs')) && readFileSync(stamp, 'utf8') === digest) return
  mkdirSync(logFolder, { recursive: true })
  const log = join(logFolder, 'build.log')
  const env = { ...npmEnvironment(), NUXT_TELEMETRY_DISABLED: '1', CI: '1' }
  await step('Building pages and server', async () => {
    const { code, output } = await run(process.execPath, [join(root, 'node_modules/nuxt/bin/nuxt.mjs'), 'build'], { cwd: root, env, log })
    if (code === 0 && existsSync(join(root, '.output/server/index.mjs'))) return
    const cause = output.split('\n').find(line => line.startsWith('Error: ')) ?? ''
    throw new PlainError(`The build failed; its whole output is in ${log}. ${cause}\nThe end of it:\n${tail(output, 15)}`)
  })
  writeFileSync(stamp, digest)
}
