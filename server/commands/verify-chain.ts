import postgres from 'postgres'
import { closePools } from '#server/database/client'
import { verifyChain } from '#server/services/audit/verify-chain'

// `DATABASE_URL=… npm run verify-chain -- [organisation id …]`: recomputes every organisation's audit chain, or those named. Exits 1 where one does not hold.
const { DATABASE_URL: url, OWNER_DATABASE_URL: ownerUrl } = process.env
let organisations = process.argv.slice(2)
if (organisations.length === 0) {
  if (!ownerUrl) {
    console.error('verify-chain: name the organisations, or set OWNER_DATABASE_URL so that they can be listed.')
    process.exit(2)
  }
  const sql = postgres(ownerUrl, { max: 1 })
  organisations = (await sql<{ id: string }[]>`select organisation_id as id from audit_heads order by 1`).map(row => row.id)
  await sql.end()
}
if (!url) {
  console.error('verify-chain: set DATABASE_URL.')
  process.exit(2)
}
let broken = 0
for (const id of organisations) {
  const { events, readings, faults } = await verifyChain(id)
  console.log(`${id}: ${events} events, ${readings} readings, ${faults.length === 0 ? 'whole' : `${faults.length} faults`}`)
  for (const text of faults) console.log(`  ${text}`)
  broken += faults.length
}
await closePools()
process.exit(broken > 0 ? 1 : 0)
