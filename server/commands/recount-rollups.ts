import postgres from 'postgres'
import { closePools } from '#server/database/client'
import { recountRollups } from '#server/services/ingest/recount-rollups'

// `npm run recount-rollups [-- --repair]`: holds every organisation's counts by day against its readings. Exits 1 where they differ and were not repaired.
const { DATABASE_URL: url, OWNER_DATABASE_URL: ownerUrl } = process.env
if (!url || !ownerUrl) {
  console.error('recount-rollups: set DATABASE_URL, and OWNER_DATABASE_URL so that the organisations can be listed.')
  process.exit(2)
}
const repair = process.argv.includes('--repair')
const sql = postgres(ownerUrl, { max: 1 })
const organisations = await sql<{ id: string, name: string }[]>`select organisation_id as id, name from organisations order by name`
await sql.end()
let different = 0
for (const { id, name } of organisations) {
  const differences = await recountRollups(id, { repair })
  console.log(`${name}: ${differences.length === 0 ? 'counts agree' : `${differences.length} differ${repair ? ', repaired' : ''}`}`)
  for (const { day, declared, verdict, kept, counted } of differences.slice(0, 20)) console.log(`  ${day} ${declared} ${verdict}: kept ${kept}, counted ${counted}`)
  different += differences.length
}
await closePools()
process.exit(different > 0 && !repair ? 1 : 0)
