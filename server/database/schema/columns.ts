import { customType, timestamp, uuid } from 'drizzle-orm/pg-core'

/** Raw bytes; the driver gives and takes Buffers. */
export const bytea = customType<{ data: Uint8Array, driverData: Uint8Array }>({ dataType: () => 'bytea' })

/** An instant; always with time zone, to the millisecond. */
export const instant = (name: string) => timestamp(name, { withTimezone: true, precision: 3, mode: 'date' })

/** Leads every key and index of a tenant table, so that it can later be the distribution column. */
export const organisationId = () => uuid('organisation_id').notNull()
