import { say } from './progress.mjs'
import { stopChildren } from './run.mjs'

const FORCE_AFTER_MILLISECONDS = 1000

/** What is to be undone, newest first. */
const undo = []
let began = 0
let exitCode = 0

/** Remembers a step of the way down. `force` is called instead when the newcomer will not wait. */
export function onStop(gently, force = () => {}) {
  undo.push({ gently, force })
}

export function isStopping() {
  return began > 0
}

/**
 * Undoes everything in reverse order, then ends the process. Called again, it changes nothing.
 *
 * @param {number} code exit code
 * @param {() => void} [lastWord] said when all is undone
 */
export async function stopAll(code, lastWord = () => {}) {
  if (isStopping()) return
  began = Date.now()
  exitCode = code
  stopChildren()
  for (const { gently } of undo.toReversed()) {
    try {
      await gently()
    } catch (error) {
      exitCode ||= 1
      process.stderr.write(`${error instanceof Error ? error.message : error}\n`)
    }
  }
  lastWord()
  process.exit(exitCode)
}

/** npm killed outright takes nothing down with it: then this process has another parent all at once. */
function stopWithNpm(code) {
  if (!process.env.npm_lifecycle_event) return
  const npm = process.ppid
  setInterval(() => {
    if (process.ppid !== npm) void stopAll(code)
  }, 1000).unref()
}

/**
 * Ctrl-C, a closed terminal and `kill` all end in an orderly stop; a second Ctrl-C does not wait.
 *
 * @param {number} codeOfSignal exit code of an orderly stop that a signal asked for
 */
export function stopOnSignals(codeOfSignal) {
  stopWithNpm(codeOfSignal)
  for (const signal of ['SIGINT', 'SIGTERM', 'SIGHUP']) {
    process.on(signal, () => {
      if (!isStopping()) {
        say(`\nStopping (${signal}); once more ends it without waiting.`)
        void stopAll(codeOfSignal)
        return
      }
      // A terminal signals the whole group and npm passes its own copy on: that is one Ctrl-C, not two.
      if (Date.now() - began < FORCE_AFTER_MILLISECONDS) return
      say('Ending without waiting.')
      stopChildren('SIGKILL')
      for (const { force } of undo.toReversed()) force()
      process.exit(1)
    })
  }
}
