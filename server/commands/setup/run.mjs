import { spawn } from 'node:child_process'
import { createWriteStream } from 'node:fs'
import { once } from 'node:events'

const running = new Set()

/** Ends every child that `run` has started and that still runs; used when the newcomer gives up halfway. */
export function stopChildren(signal = 'SIGTERM') {
  for (const child of running) child.kill(signal)
}

/**
 * Runs a program to its end.
 *
 * @param {string} program
 * @param {string[]} args
 * @param {object} [options]
 * @param {string} [options.cwd]
 * @param {NodeJS.ProcessEnv} [options.env]
 * @param {{ uid: number, gid: number } | null} [options.as] the user to run as; only root may give one
 * @param {string} [options.log] file that gets the output instead of the answer
 * @param {boolean} [options.show] output goes straight to the screen
 * @param {(line: string) => void} [options.onLine] told the newest line of the output
 * @returns {Promise<{ code: number, output: string }>} output is the last 64 KiB, empty with `show`
 */
export async function run(program, args, { cwd, env = process.env, as = null, log, show = false, onLine } = {}) {
  const child = spawn(program, args, {
    cwd,
    env,
    ...(as ?? {}),
    stdio: show ? ['ignore', 'inherit', 'inherit'] : ['ignore', 'pipe', 'pipe'],
  })
  running.add(child)
  let output = ''
  const file = log ? createWriteStream(log) : null
  if (!show) {
    for (const stream of [child.stdout, child.stderr]) {
      stream.setEncoding('utf8')
      stream.on('data', (text) => {
        output = (output + text).slice(-65_536)
        file?.write(text)
        const line = text.trimEnd().split('\n').at(-1)
        if (line) onLine?.(line)
      })
    }
  }
  try {
    // 'close' comes after both streams have ended, so nothing of the output is lost.
    const [code, signal] = await once(child, 'close')
    return { code: code ?? (signal ? 1 : 0), output }
  } catch (error) {
    return { code: 127, output: String(error instanceof Error ? error.message : error) }
  } finally {
    running.delete(child)
    file?.end()
  }
}

/** The last lines of an output, for the end of an error message. */
export function tail(text, lines = 25) {
  return text.trimEnd().split('\n').slice(-lines).join('\n')
}
