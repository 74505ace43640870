import { cpSync, existsSync, mkdirSync, mkdtempSync, realpathSync, rmSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { fileURLToPath } from 'node:url'
import { ensureBuild } from './build.mjs'
import { ensureChromium } from './chromium.mjs'
import { countCheck, countPlaywright, countVitest, sum, summaryLine } from './counts.mjs'
import { ensurePackages, npmEnvironment } from './packages.mjs'
import { PlainError } from './plain-error.mjs'
import { ensurePostgres } from './postgres-binaries.mjs'
import { say } from './progress.mjs'
import { run } from './run.mjs'
import { isStopping, onStop, stopAll, stopOnSignals } from './stop.mjs'
import { throwAwayCluster } from './throw-away-cluster.mjs'

/** In the order of running: what is quick and tells most comes first. */
const PARTS = ['lint', 'types', 'unit', 'database', 'http', 'browser']
const NEEDS_DATABASE = ['database', 'http', 'browser']
const NEEDS_BUILD = ['http', 'browser']

/** `npm test -- unit http tests/http/intake.test.ts`: names of parts, then files for them. */
export function parseArguments(args) {
  const parts = PARTS.filter(part => args.includes(part))
  const filters = args.filter(arg => !PARTS.includes(arg))
  for (const arg of filters) {
    if (!/[./]/.test(arg)) throw new PlainError(`There is no part "${arg}"; the parts are ${PARTS.join(', ')}, and behind them may stand test files.`)
  }
  if (filters.length > 0 && parts.length !== 1) throw new PlainError('Test files need the one part that they belong to before them, for example: npm test -- http tests/http/intake.test.ts')
  return { parts: parts.length > 0 ? parts : PARTS, filters }
}

async function runPart(part, { root, env, folder, filters }) {
  const tool = (path, args) => run(process.execPath, [join(root, 'node_modules', path), ...args], { cwd: root, env, show: true })
  const report = join(folder, `${part}.json`)
  if (part === 'lint') return countCheck((await tool('eslint/bin/eslint.js', ['.', '--max-warnings=0'])).code)
  if (part === 'types') {
    const pages = await tool('nuxt/bin/nuxt.mjs', ['typecheck'])
    const others = await tool('typescript/bin/tsc', ['--noEmit', '--project', 'tests/tsconfig.json'])
    return sum([countCheck(pages.code), countCheck(others.code)])
  }
  if (part === 'browser') {
    const { code } = await run(process.execPath, [join(root, 'node_modules/@playwright/test/cli.js'), 'test', ...filters], { cwd: root, env: { ...env, PLAYWRIGHT_REPORT: report }, show: true })
    return countPlaywright(report, code)
  }
  const { code } = await tool('vitest/vitest.mjs', ['run', '--project', part, '--reporter=default', '--reporter=json', `--outputFile.json=${report}`, ...filters])
  return countVitest(report, code)
}

/** Installs, builds and starts what the parts need. */
async function prepare(root, parts, folder) {
  await ensurePackages(root)
  const env = { ...npmEnvironment(), NUXT_TELEMETRY_DISABLED: '1' }
  // Whatever this machine serves must not be touched by a test.
  for (const name of Object.keys(env)) if (/^(DATABASE_URL|OWNER_DATABASE_URL|COLDSLIP_.*|HOST|PORT|PG[A-Z]+)$/.test(name)) delete env[name]
  // What a test that was cut off leaves behind goes with the run's own folder.
  env.TMPDIR = join(folder, 'tmp')
  mkdirSync(env.TMPDIR)
  if (parts.includes('browser')) await ensureChromium()
  const needsDatabase = parts.some(part => NEEDS_DATABASE.includes(part))
  const postgres = needsDatabase ? await ensurePostgres() : null
  if (parts.some(part => NEEDS_BUILD.includes(part))) {
    await ensureBuild(root, join(root, '.data'))
    // Away from the project, so that a file that the build forgot is missed here and not at a customer's.
    env.TEST_BUILD = join(folder, 'build')
    cpSync(join(root, '.output'), env.TEST_BUILD, { recursive: true, verbatimSymlinks: true })
  }
  if (parts.includes('types') || parts.includes('lint')) await ensureGeneratedTypes(root, env)
  if (postgres) {
    const cluster = await throwAwayCluster(postgres.folder)
    onStop(cluster.remove)
    env.TEST_CLUSTER_URL = cluster.url
  }
  return env
}

async function ensureGeneratedTypes(root, env) {
  if (existsSync(join(root, '.nuxt/tsconfig.app.json'))) return
  const { code, output } = await run(process.execPath, [join(root, 'node_modules/nuxt/bin/nuxt.mjs'), 'prepare'], { cwd: root, env })
  if (code !== 0) throw new PlainError(`nuxt prepare failed:\n${output}`)
}

async function runAll() {
  const root = realpathSync(fileURLToPath(new URL('../../..', import.meta.url)))
  process.chdir(root)
  const { parts, filters } = parseArguments(process.argv.slice(2))
  const folder = mkdtempSync(join(tmpdir(), 'coldslip-test-'))
  onStop(() => rmSync(folder, { recursive: true, force: true }))
  const env = await prepare(root, parts, folder)

  const results = []
  for (const part of parts) {
    const began = Date.now()
    say(`\n== ${part}`)
    const counts = await runPart(part, { root, env, folder, filters })
    results.push({ part, ...counts, seconds: Math.round((Date.now() - began) / 1000) })
    if (isStopping()) return null
  }
  say('\nPart       passed  failed  skipped  seconds')
  for (const { part, passed, failed, skipped, seconds } of results) {
    say(`${part.padEnd(10)} ${String(passed).padStart(6)}  ${String(failed).padStart(6)}  ${String(skipped).padStart(7)}  ${String(seconds).padStart(7)}`)
  }
  return sum(results)
}

/** Everything that `npm test` does; its last line is `N passed, N failed`. */
export async function runTests() {
  // Given up halfway, the checks have not passed.
  stopOnSignals(130)
  let counts = { passed: 0, failed: 1, skipped: 0 }
  try {
    counts = await runAll() ?? counts
  } catch (error) {
    if (isStopping()) return
    process.stderr.write(`\n${error instanceof PlainError ? error.message : error.stack}\n`)
  }
  await stopAll(counts.failed > 0 || counts.passed === 0 ? 1 : 0, () => say(summaryLine(counts)))
}
