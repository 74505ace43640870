import { existsSync, readFileSync, writeFileSync } from 'node:fs'
import { join } from 'node:path'
import { PlainError } from './plain-error.mjs'
import { step } from './progress.mjs'
import { run, tail } from './run.mjs'

/**
 * Loads the invented demo scenario, unless it is there. It goes the way of every delivery, so it takes a while.
 *
 * @param {object} options
 * @param {string} options.root
 * @param {string} options.demoFile
 * @param {string} options.baseUrl
 * @param {NodeJS.ProcessEnv} options.env of the server
 * @param {string} options.owner
 * @param {boolean} options.databaseIsNew or not known to be ours: then demo.json may belong to another database
 */
export async function ensureDemo({ root, demoFile, baseUrl, env, owner, databaseIsNew }) {
  if (databaseIsNew || !existsSync(demoFile)) {
    const log = join(root, '.data/demo.log')
    await step('Loading the demo scenario', async (detail) => {
      const { code, output } = await run(process.execPath, ['--import', 'tsx', 'server/commands/load-demo.ts'], {
        cwd: root, log, onLine: detail, env: { ...env, OWNER_DATABASE_URL: owner, DEMO_FILE: demoFile, BASE_URL: baseUrl },
      })
      if (code !== 0 || !existsSync(demoFile)) throw new PlainError(`The demo scenario was not loaded; its log is ${log}. The end of it:\n${tail(output, 10)}`)
    })
  }
  const demo = readDemo(demoFile)
  if (demo.baseUrl === baseUrl) return demo
  const moved = { ...demo, baseUrl }
  writeFileSync(demoFile, `${JSON.stringify(moved, null, 2)}\n`, { mode: 0o600 })
  return moved
}

function readDemo(demoFile) {
  try {
    return JSON.parse(readFileSync(demoFile, 'utf8'))
  } catch {
    throw new PlainError(`${demoFile} is damaged; remove it and start again, and it is written anew.`)
  }
}

/** @returns {string[]} lines for the terminal */
export function demoLines({ signIns, deviceToken, instrumentSerial }) {
  const rows = signIns.map(({ role, email, password, shop }) => [role, email, password, shop ?? ''])
  const widths = [0, 1, 2].map(column => Math.max(...rows.map(row => row[column].length)))
  return [
    'Demo sign-ins (invented people and figures; this machine only):',
    ...rows.map(row => `  ${row.map((cell, i) => cell.padEnd(widths[i] ?? 0)).join('  ').trimEnd()}`),
    `Demo instrument ${instrumentSerial}, device token ${deviceToken}`,
  ]
}
