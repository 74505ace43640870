import { integer, jsonb, pgTable, primaryKey, uuid } from 'drizzle-orm/pg-core'
import { instant, organisationId } from './columns'
import type { LimitSet } from '#shared/verdict/types'

/** Versions are only added: a verdict names the one it used, so none is ever changed. */
export const limitSets = pgTable('limit_sets', {
  organisationId: organisationId(),
  version: integer('version').notNull(),
  content: jsonb('content').$type<LimitSet>().notNull(),
  effectiveFrom: instant('effective_from').notNull(),
  createdBy: uuid('created_by'),
  createdAt: instant('created_at').notNull().defaultNow(),
}, t => [primaryKey({ name: 'limit_sets_pkey', columns: [t.organisationId, t.version] })])
