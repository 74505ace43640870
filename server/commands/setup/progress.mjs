const live = process.stdout.isTTY === true
const REMIND_MILLISECONDS = live ? 1000 : 15_000

export function say(text = '') {
  process.stdout.write(`${text}\n`)
}

function seconds(since) {
  return `${((Date.now() - since) / 1000).toFixed(1)} s`
}

/**
 * Runs a long step and shows that it is alive: a running clock on a terminal, a line every 15 seconds
 * in a log.
 *
 * @template T
 * @param {string} title
 * @param {(detail: (text: string) => void) => Promise<T>} work may tell how far it is
 * @returns {Promise<T>}
 */
export async function step(title, work) {
  const began = Date.now()
  process.stdout.write(live ? `… ${title}` : `… ${title}\n`)
  let far = ''
  const clock = setInterval(() => {
    const line = `${title} (${Math.round((Date.now() - began) / 1000)} s)${far ? `: ${far}` : ''}`
    process.stdout.write(live ? `\r\u001b[K… ${line.slice(0, (process.stdout.columns || 80) - 3)}` : `  still busy: ${line}\n`)
  }, REMIND_MILLISECONDS)
  try {
    const result = await work((text) => { far = text })
    say(`${live ? '\r\u001b[K' : ''}✓ ${title} (${seconds(began)})`)
    return result
  } catch (error) {
    say(`${live ? '\r\u001b[K' : ''}✗ ${title} (${seconds(began)})`)
    throw error
  } finally {
    clearInterval(clock)
  }
}
