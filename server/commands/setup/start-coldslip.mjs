import { existsSync, realpathSync } from 'node:fs'
import { join } from 'node:path'
import { fileURLToPath } from 'node:url'
import { ensureBuild } from './build.mjs'
import { ensureDataFolder } from './data-folder.mjs'
import { migrate, namedDatabase, ownDatabase } from './database.mjs'
import { demoLines, ensureDemo } from './demo.mjs'
import { ensurePackages } from './packages.mjs'
import { PlainError } from './plain-error.mjs'
import { checkServerPort, isLoopback, parsePort } from './ports.mjs'
import { say } from './progress.mjs'
import { addressOf, startServerProcess } from './server-process.mjs'
import { claimStart } from './single-start.mjs'
import { isStopping, onStop, stopAll, stopOnSignals } from './stop.mjs'

async function bringUp() {
  const root = realpathSync(fileURLToPath(new URL('../../..', import.meta.url)))
  process.chdir(root)
  if (existsSync('.env')) process.loadEnvFile('.env')
  const host = process.env.HOST || '127.0.0.1'
  const port = parsePort(process.env.PORT)
  const baseUrl = addressOf(host, port)
  const dataFolder = join(root, '.data')
  ensureDataFolder(dataFolder)
  onStop(claimStart(root, dataFolder))
  await checkServerPort(host, port)

  await ensurePackages(root)
  const named = Boolean(process.env.DATABASE_URL)
  const database = named ? namedDatabase(dataFolder, process.env) : await ownDatabase(root, dataFolder)
  const { owner, secrets } = database
  const migrated = await migrate(root, dataFolder, owner, process.env.APP_ROLE_PASSWORD || secrets.applicationPassword)
  await ensureBuild(root, dataFolder)

  const { OWNER_DATABASE_URL: _owner, APP_ROLE_PASSWORD: _password, ...inherited } = process.env
  const env = {
    ...inherited,
    NODE_ENV: 'production',
    HOST: host,
    PORT: String(port),
    NITRO_SHUTDOWN_TIMEOUT: '10000',
    DATABASE_URL: database.application ?? migrated,
    NUXT_SESSION_PASSWORD: process.env.NUXT_SESSION_PASSWORD || secrets.sessionPassword,
    COLDSLIP_SIGNING_KEY: process.env.COLDSLIP_SIGNING_KEY || secrets.signingKey,
  }
  const demo = await demoFor({ root, dataFolder, baseUrl, host, env, owner, named, databaseIsNew: database.isNew ?? true })
  const server = startServerProcess(root, { ...env, ...(demo ? { COLDSLIP_DEMO: '1', COLDSLIP_DEMO_FILE: join(dataFolder, 'demo.json') } : { COLDSLIP_DEMO: '0' }) })
  onStop(() => server.stop(), () => server.kill())
  await server.waitUntilReady(baseUrl)

  say(`\nColdslip is ready at ${baseUrl}`)
  if (demo) say(`\n${demoLines(demo).join('\n')}`)
  say('\nCtrl-C stops it.')

  const how = await server.ended
  if (!isStopping()) throw new PlainError(`The server ended by itself (${how}); its own message is above.`)
}

/** The demo scenario belongs to the clone's own database on loopback; anywhere else only to who asks for it. */
async function demoFor({ root, dataFolder, baseUrl, host, env, owner, named, databaseIsNew }) {
  const wish = process.env.COLDSLIP_DEMO
  if (wish === '0' || (named && wish !== '1')) return null
  if (!isLoopback(host)) {
    if (wish === '1') throw new PlainError(`Demo accounts are refused on ${host}, because others could reach them; start with HOST=127.0.0.1, or without COLDSLIP_DEMO=1.`)
    say(`Demo accounts are refused on ${host}: none were loaded, and those of an earlier start cannot sign in.`)
    return null
  }
  return ensureDemo({ root, demoFile: join(dataFolder, 'demo.json'), baseUrl, env, owner, databaseIsNew })
}

/** Everything that `npm start` does, until Ctrl-C. */
export async function startColdslip() {
  stopOnSignals(0)
  try {
    await bringUp()
  } catch (error) {
    // A step cut off by Ctrl-C fails too; that is no news.
    if (isStopping()) return
    process.stderr.write(`\n${error instanceof PlainError ? error.message : error.stack}\n`)
    await stopAll(1)
  }
}
