import { existsSync } from 'node:fs'
import postgres from 'postgres'
import { SINCE_DAYS, demoScenario } from '#fixtures/demo/scenario'
import { ORGANISATION } from '#fixtures/demo/shops'
import type { DemoSubmission } from '#fixtures/demo/types'
import { closePools } from '#server/database/client'
import { completeSubjects } from './demo/complete-subjects'
import { deliver } from './demo/deliver'
import { writeDemoFile } from './demo/demo-file'
import { ensureOrganisation, type LoadedOrganisation } from './demo/ensure-organisation'

// `DATABASE_URL=… OWNER_DATABASE_URL=… DEMO_FILE=… BASE_URL=… node --import tsx server/commands/load-demo.ts`:
// loads the invented scenario the way of every delivery. Run again, it goes on where it was cut off, and does nothing once all is there.

const DAY = 86_400_000

/** The end of the story of a load that was begun before; null where none was. The first limits hold from its beginning. */
async function begunBefore(owner: postgres.Sql): Promise<Date | null> {
  const [row] = await owner<{ since: Date }[]>`
    select l.effective_from as since from organisations o join limit_sets l on l.organisation_id = o.organisation_id and l.version = 1
    where o.demo and o.name = ${ORGANISATION}`
  return row ? new Date(row.since.getTime() + SINCE_DAYS * DAY) : null
}

async function deliverAll(submissions: readonly DemoSubmission[], organisations: ReadonlyMap<string, LoadedOrganisation>): Promise<void> {
  let shown = -1
  // One after the other: verdicts look back at earlier samples of the same visit, so the order of receipt counts.
  for (const [i, submission] of submissions.entries()) {
    await deliver(organisations.get(submission.organisation)!, submission, `demo-${i}`)
    const percent = Math.floor((i + 1) / submissions.length * 20) * 5
    if (percent > shown) console.log(`Loading the demo scenario: ${shown = percent} %`)
  }
}

async function load(owner: postgres.Sql, demoFile: string, baseUrl: string): Promise<void> {
  const begun = await begunBefore(owner)
  if (begun !== null && existsSync(demoFile)) {
    console.log('The demo scenario is there already.')
    return
  }
  const now = new Date()
  const scenario = demoScenario({ now: begun ?? now })
  const { organisation, otherOrganisation, since } = scenario
  const own = await ensureOrganisation(owner, organisation, { since, now })
  const other = await ensureOrganisation(owner, otherOrganisation, { since, now })
  await deliverAll([...scenario.submissions()], new Map([[organisation.name, own], [otherOrganisation.name, other]]))
  await completeSubjects(own.organisationId, organisation, now)
  await completeSubjects(other.organisationId, otherOrganisation, now)
  // What was just filled in has no statistics yet, and the first pages would be planned blindly.
  await owner`analyze`
  await writeDemoFile(demoFile, baseUrl, own, { people: organisation.people, strangers: otherOrganisation.people, now })
}

const { DATABASE_URL: url, OWNER_DATABASE_URL: ownerUrl, DEMO_FILE: demoFile, BASE_URL: baseUrl } = process.env
if (!url || !ownerUrl || !demoFile || !baseUrl) {
  console.error('load-demo: set DATABASE_URL, OWNER_DATABASE_URL, DEMO_FILE and BASE_URL.')
  process.exit(2)
}
const owner = postgres(ownerUrl, { max: 1, onnotice: () => {} })
try {
  await load(owner, demoFile, baseUrl)
} finally {
  await owner.end()
  await closePools()
}
