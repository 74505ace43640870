import { spawn, type ChildProcess } from 'node:child_process'
import { generateKeyPairSync } from 'node:crypto'
import { mkdtemp, rm } from 'node:fs/promises'
import { createServer } from 'node:net'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { fileURLToPath } from 'node:url'

const READY_WITHIN_MILLISECONDS = 60_000
const STOPS_WITHIN_MILLISECONDS = 30_000

/** `npm test` names a copy of the build outside the project, where no file of the source tree helps out. */
const BUILD = process.env.TEST_BUILD ?? fileURLToPath(new URL('../../.output', import.meta.url))

/** Signs the tests' certificates and nothing else. */
const SIGNING_KEY = generateKeyPairSync('ed25519').privateKey.export({ format: 'der', type: 'pkcs8' }).toString('base64')

export interface TestServer {
  baseUrl: string
  /** Asks the server to end and waits for it. @returns its exit code. @throws Error when it does not end in time. */
  stop: () => Promise<number>
  /** Ends it as a power cut would, with no chance to tidy up. */
  kill: () => Promise<void>
  /** Everything it has printed so far. */
  logs: () => string
  pid: number
}

export interface StartOptions {
  databaseUrls: { appUrl: string }
  env?: Record<string, string>
  /** One that was free a moment ago, to start again on the same address; otherwise any free one. */
  port?: number
}

export function freePort(): Promise<number> {
  return new Promise((resolve, reject) => {
    const server = createServer()
    server.once('error', reject)
    server.listen(0, '127.0.0.1', () => {
      const address = server.address()
      server.close(() => (address && typeof address === 'object' ? resolve(address.port) : reject(new Error('no port'))))
    })
  })
}

const pause = (milliseconds: number) => new Promise<void>(resolve => setTimeout(resolve, milliseconds))

async function isReady(baseUrl: string): Promise<boolean> {
  try {
    return (await fetch(`${baseUrl}/api/ready`, { signal: AbortSignal.timeout(2000) })).ok
  } catch {
    return false
  }
}

async function waitUntilReady(baseUrl: string, hasEnded: () => boolean, logs: () => string): Promise<void> {
  const deadline = Date.now() + READY_WITHIN_MILLISECONDS
  while (!(await isReady(baseUrl))) {
    if (hasEnded()) throw new Error(`The server ended while starting:\n${logs()}`)
    if (Date.now() > deadline) throw new Error(`The server was not ready after ${READY_WITHIN_MILLISECONDS / 1000} s:\n${logs()}`)
    await pause(50)
  }
}

function endOf(child: ChildProcess): Promise<number> {
  return new Promise(resolve => child.once('close', (code, signal) => resolve(code ?? (signal ? 1 : 0))))
}

/** Starts the built server on a port of its own, in an empty working folder, and waits until it is ready. */
export async function startServer({ databaseUrls, env = {}, port }: StartOptions): Promise<TestServer> {
  const chosen = port ?? await freePort()
  const cwd = await mkdtemp(join(tmpdir(), 'coldslip-server-'))
  const child = spawn(process.execPath, [join(BUILD, 'server/index.mjs')], {
    cwd,
    stdio: ['ignore', 'pipe', 'pipe'],
    env: {
      PATH: process.env.PATH,
      TZ: process.env.TZ,
      NODE_ENV: 'production',
      HOST: '127.0.0.1',
      PORT: String(chosen),
      DATABASE_URL: databaseUrls.appUrl,
      NUXT_SESSION_PASSWORD: 'a-session-password-for-tests-only-32+',
      COLDSLIP_SIGNING_KEY: SIGNING_KEY,
      ...env,
    },
  })
  let output = ''
  let ended = false
  for (const stream of [child.stdout, child.stderr]) stream.setEncoding('utf8').on('data', (text: string) => { output += text })
  const end = endOf(child).then(async (code) => {
    ended = true
    await rm(cwd, { recursive: true, force: true })
    return code
  })
  const baseUrl = `http://127.0.0.1:${chosen}`
  const logs = () => output
  const kill = async () => {
    child.kill('SIGKILL')
    await end
  }
  const stop = async () => {
    child.kill('SIGTERM')
    let timer: NodeJS.Timeout | undefined
    const late = new Promise<never>((_, reject) => {
      timer = setTimeout(() => reject(new Error(`The server did not stop in ${STOPS_WITHIN_MILLISECONDS / 1000} s:\n${output}`)), STOPS_WITHIN_MILLISECONDS)
    })
    try {
      return await Promise.race([end, late])
    } catch (error) {
      await kill()
      throw error
    } finally {
      clearTimeout(timer)
    }
  }
  try {
    await waitUntilReady(baseUrl, () => ended, logs)
  } catch (error) {
    await kill()
    throw error
  }
  return { baseUrl, stop, kill, logs, pid: child.pid! }
}
