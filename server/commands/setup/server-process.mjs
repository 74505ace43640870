import { spawn } from 'node:child_process'
import { join } from 'node:path'
import { PlainError } from './plain-error.mjs'

const READY_WITHIN_MILLISECONDS = 60_000
const STOPS_WITHIN_MILLISECONDS = 15_000

const pause = milliseconds => new Promise(resolve => setTimeout(resolve, milliseconds))

/** The address under which this machine reaches a server that listens on `host`. */
export function addressOf(host, port) {
  const bare = host.replace(/^\[|\]$/g, '')
  if (bare === '0.0.0.0') return `http://127.0.0.1:${port}`
  if (bare === '::') return `http://[::1]:${port}`
  return `http://${bare.includes(':') ? `[${bare}]` : bare}:${port}`
}

async function isReady(baseUrl) {
  try {
    return (await fetch(`${baseUrl}/api/ready`, { signal: AbortSignal.timeout(2000) })).ok
  } catch {
    return false
  }
}

/**
 * Starts the built server as a process group of its own, so that Ctrl-C reaches this command first.
 *
 * @param {string} root
 * @param {NodeJS.ProcessEnv} env
 */
export function startServerProcess(root, env) {
  const follow = new URL('./follow-parent.mjs', import.meta.url).href
  const child = spawn(process.execPath, ['--import', follow, join(root, '.output/server/index.mjs')], {
    cwd: root,
    env,
    detached: true,
    stdio: ['ignore', 'inherit', 'inherit', 'ipc'],
  })
  const ended = new Promise((resolve) => {
    child.once('exit', (code, signal) => resolve(signal ?? code))
    child.once('error', error => resolve(error.message))
  })
  let gone = false
  void ended.then(() => { gone = true })

  const kill = () => {
    if (gone || !child.pid) return
    try {
      process.kill(-child.pid, 'SIGKILL')
    } catch {
      // It ended between the question and the signal.
    }
  }

  return {
    /** Settles with the exit code or signal when the server has ended. */
    ended,
    kill,
    async waitUntilReady(baseUrl) {
      const deadline = Date.now() + READY_WITHIN_MILLISECONDS
      while (!(await isReady(baseUrl))) {
        if (gone) throw new PlainError(`The server ended while starting (${await ended}); its own message is above.`)
        if (Date.now() > deadline) throw new PlainError(`The server was not ready within ${READY_WITHIN_MILLISECONDS / 1000} s; its own messages are above.`)
        await pause(100)
      }
    },
    /** Lets requests and running jobs end, for 15 seconds at most. */
    async stop() {
      if (!gone) child.kill('SIGTERM')
      const late = new AbortController()
      const timer = setTimeout(() => late.abort(), STOPS_WITHIN_MILLISECONDS)
      await Promise.race([ended, new Promise(resolve => late.signal.addEventListener('abort', resolve))])
      clearTimeout(timer)
      kill()
      await ended
    },
  }
}
