import { writeFile } from 'node:fs/promises'
import { fileURLToPath } from 'node:url'
import { migrateDatabase } from '#server/database/migrate'

// Run before any web or worker process: `OWNER_DATABASE_URL=… APP_ROLE_PASSWORD=… node --import tsx server/commands/migrate.ts`
const { OWNER_DATABASE_URL: ownerUrl, APP_ROLE_PASSWORD: appRolePassword, MIGRATE_RESULT: resultFile } = process.env
if (!ownerUrl || !appRolePassword) {
  console.error('Migrate: set OWNER_DATABASE_URL and APP_ROLE_PASSWORD.')
  process.exit(2)
}
try {
  const { applicationUrl } = await migrateDatabase({ ownerUrl, appRolePassword, folder: fileURLToPath(new URL('../database/migrations', import.meta.url)) })
  if (resultFile) await writeFile(resultFile, JSON.stringify({ databaseUrl: applicationUrl }), { mode: 0o600 })
} catch (error) {
  const cause = error instanceof Error && error.cause instanceof Error ? error.cause : error
  console.error(`Migrate: ${cause instanceof Error ? cause.message : String(cause)}`)
  process.exit(1)
}
