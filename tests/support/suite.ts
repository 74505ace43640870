import postgres from 'postgres'
import { createTestDatabase, type TestDatabase } from './cluster'
import { makeOrganisation, type TestOrganisation } from './organisation'
import { startServer, type TestServer } from './server'

export interface Suite {
  database: TestDatabase
  server: TestServer
  /** Superuser connection that sees every row: for looking, never for doing. */
  owner: postgres.Sql
  /** Two organisations that must not see each other. */
  a: TestOrganisation
  b: TestOrganisation
  stop: () => Promise<void>
}

/** A database of its own with two organisations, and the built server on it. */
export async function startSuite(env: Record<string, string> = {}): Promise<Suite> {
  const database = await createTestDatabase()
  process.env.DATABASE_URL = database.appUrl
  const { closePools } = await import('#server/database/client')
  const a = await makeOrganisation('a')
  const b = await makeOrganisation('b')
  const server = await startServer({ databaseUrls: database, env })
  const owner = postgres(database.ownerUrl, { max: 2, onnotice: () => {} })
  return {
    database, server, owner, a, b,
    stop: async () => {
      await owner.end()
      await closePools()
      const code = await server.stop()
      await database.drop()
      if (code !== 0) throw new Error(`The server ended with ${code}:\n${server.logs()}`)
    },
  }
}
