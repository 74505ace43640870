import { connect as connectSocket, type Socket } from 'node:net'
import { drizzle, type PostgresJsDatabase } from 'drizzle-orm/postgres-js'
import postgres from 'postgres'
import { settings } from '../settings'
import * as audit from './schema/audit'
import * as certificates from './schema/certificates'
import * as instruments from './schema/instruments'
import * as limits from './schema/limits'
import * as organisations from './schema/organisations'
import * as readings from './schema/readings'
import * as subjects from './schema/subjects'
import * as submissions from './schema/submissions'

export const schema = { ...organisations, ...instruments, ...subjects, ...limits, ...submissions, ...readings, ...audit, ...certificates }
export type Database = PostgresJsDatabase<typeof schema>

/**
 * Two pools. The ORM replaces the serialisers of the client it is given (dates and JSON pass through as
 * text), so bulk statements, COPY and LISTEN have a client of their own. Both are made here and nowhere
 * else, so that they can be counted, and rebuilt.
 */
interface Pools {
  database: Database
  orm: postgres.Sql
  bulk: postgres.Sql
}

let pools: Pools | null = null

/**
 * Small messages go out at once: under Nagle's algorithm the end of a COPY waits for the server's delayed
 * acknowledgement (RFC 896, RFC 1122 4.2.3.2), about 40 ms twice for every small delivery.
 */
function openSocket({ host, port, path }: { host: string[], port: number[], path?: string | false }): Socket {
  return path ? connectSocket({ path }) : connectSocket({ host: host[0]!, port: port[0]!, noDelay: true })
}

function connect(max: number): postgres.Sql {
  const options = {
    // The driver takes it, its types don't name it.
    socket: openSocket,
    max,
    connect_timeout: 5,
    idle_timeout: 300,
    max_lifetime: 3600,
    onnotice: () => {},
    connection: { application_name: 'coldslip', statement_timeout: 60_000, idle_in_transaction_session_timeout: 60_000 },
  }
  return postgres(settings().databaseUrl, options)
}

function open(): Pools {
  if (!pools) {
    const orm = connect(settings().poolSize)
    pools = { orm, database: drizzle(orm, { schema }), bulk: connect(settings().poolSize) }
  }
  return pools
}

export const database = (): Database => open().database
export const bulkClient = (): postgres.Sql => open().bulk

export async function closePools(): Promise<void> {
  const closing = pools
  pools = null
  if (closing) await Promise.all([closing.orm.end({ timeout: 3 }), closing.bulk.end({ timeout: 3 })])
}
