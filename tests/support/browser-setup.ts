import { spawn } from 'node:child_process'
import { mkdtemp, rm } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { fileURLToPath } from 'node:url'
import { createTestDatabase } from './cluster'
import { freePort, startServer } from './server'

const ROOT = fileURLToPath(new URL('../..', import.meta.url))
const LOADS_WITHIN_MILLISECONDS = 300_000

function loadDemo(env: Record<string, string>): Promise<void> {
  return new Promise((resolve, reject) => {
    const child = spawn(process.execPath, ['--import', 'tsx', 'server/commands/load-demo.ts'], {
      cwd: ROOT,
      env: { PATH: process.env.PATH, ...env },
      stdio: ['ignore', 'pipe', 'pipe'],
      timeout: LOADS_WITHIN_MILLISECONDS,
    })
    let output = ''
    for (const stream of [child.stdout, child.stderr]) stream.setEncoding('utf8').on('data', (text: string) => { output += text })
    child.once('error', reject)
    child.once('close', code => (code === 0 ? resolve() : reject(new Error(`The demo scenario was not loaded:\n${output}`))))
  })
}

/**
 * One server with the demo scenario on a database of its own, for all browser tests. Its address goes into
 * BASE_URL and its demo.json into DEMO_FILE. With BASE_URL set from outside, that server is used instead.
 */
export default async function startDemoServer(): Promise<() => Promise<void>> {
  if (process.env.BASE_URL) {
    process.env.DEMO_FILE ??= join(ROOT, '.data/demo.json')
    return async () => {}
  }
  const folder = await mkdtemp(join(tmpdir(), 'coldslip-demo-'))
  const demoFile = join(folder, 'demo.json')
  const database = await createTestDatabase()
  const port = await freePort()
  const baseUrl = `http://127.0.0.1:${port}`
  await loadDemo({
    DATABASE_URL: database.appUrl,
    OWNER_DATABASE_URL: database.ownerUrl,
    DEMO_FILE: demoFile,
    BASE_URL: baseUrl,
    NUXT_SESSION_PASSWORD: 'a-session-password-for-tests-only-32+',
    HOST: '127.0.0.1',
  })
  const server = await startServer({ databaseUrls: database, port, env: { COLDSLIP_DEMO: '1', COLDSLIP_DEMO_FILE: demoFile } })
  process.env.BASE_URL = server.baseUrl
  process.env.DEMO_FILE = demoFile
  return async () => {
    const code = await server.stop()
    await database.drop()
    await rm(folder, { recursive: true, force: true })
    if (code !== 0) throw new Error(`The server ended with ${code}:\n${server.logs()}`)
  }
}
