import { and, asc, desc, eq, gt, inArray, lt, or, sql } from 'drizzle-orm'
import type { RefusedRow, SubmissionDetail, SubmissionList, SubmissionRow } from '#shared/api/intake'
import { instruments } from '../../database/schema/instruments'
import { people, shops } from '../../database/schema/organisations'
import { refusedRows, submissions } from '../../database/schema/submissions'
import { withOrganisation, type Transaction } from '../../database/tenancy'
import type { Scope } from '../readings/reading-filters'

const PAGE = 50
/** More refused rows than this are told by a count and given as a download. */
const MOST_REFUSED_SHOWN = 1000

const columns = {
  submission: submissions,
  shop: shops.name,
  serial: instruments.serial,
  person: people.name,
}

function select(tx: Transaction) {
  return tx.select(columns).from(submissions)
    .innerJoin(shops, and(eq(shops.organisationId, submissions.organisationId), eq(shops.id, submissions.shopId)))
    .leftJoin(instruments, and(eq(instruments.organisationId, submissions.organisationId), eq(instruments.id, submissions.instrumentId)))
    .leftJoin(people, and(eq(people.organisationId, submissions.organisationId), eq(people.id, submissions.personId)))
}

type Selected = Awaited<ReturnType<typeof select>>[number]

function rowOf({ submission: s, shop, serial, person }: Selected): SubmissionRow {
  return {
    id: s.id,
    status: s.status,
    source: s.source,
    sender: serial ?? person ?? shop,
    mediaType: s.mediaType,
    byteLength: s.byteLength,
    sha256: Buffer.from(s.sha256).toString('hex'),
    receivedAt: s.receivedAt.toISOString(),
    processedAt: s.processedAt?.toISOString() ?? null,
    received: s.receivedCount,
    accepted: s.acceptedCount,
    repeated: s.repeatedCount,
    refused: s.refusedCount,
    failure: s.failure,
  }
}

const inShops = ({ organisationId, shopIds }: Scope) => and(eq(submissions.organisationId, organisationId),
  inArray(submissions.shopId, shopIds.length > 0 ? shopIds : ['00000000-0000-0000-0000-000000000000']))

export interface SubmissionsQuery {
  /** The last one's time and id. */
  cursor: { receivedAt: Date, id: string } | null
  /** Leaves out what was taken in whole or still waits. */
  onlyRefused: boolean
}

/** Newest first. */
export async function listSubmissions(scope: Scope, { cursor, onlyRefused }: SubmissionsQuery): Promise<SubmissionList> {
  return withOrganisation(scope.organisationId, async (tx) => {
    const rows = await select(tx)
      .where(and(inShops(scope),
        onlyRefused ? or(eq(submissions.status, 'failed'), gt(submissions.refusedCount, 0)) : undefined,
        cursor ? or(lt(submissions.receivedAt, cursor.receivedAt), and(eq(submissions.receivedAt, cursor.receivedAt), lt(submissions.id, cursor.id))) : undefined))
      .orderBy(desc(submissions.receivedAt), desc(submissions.id)).limit(PAGE + 1)
    const page = rows.slice(0, PAGE)
    const last = page.at(-1)?.submission
    return { submissions: page.map(rowOf), nextCursor: rows.length > PAGE && last ? `${last.receivedAt.getTime()}.${last.id}` : null }
  })
}

/** What still waits, and what came in the last two days with something refused. */
export async function listOpenSubmissions(tx: Transaction, scope: Scope): Promise<SubmissionRow[]> {
  const rows = await select(tx)
    .where(and(inShops(scope), sql`${submissions.receivedAt} > now() - interval '2 days'`,
      or(inArray(submissions.status, ['received', 'processing', 'failed']), sql`${submissions.refusedCount} > 0`)))
    .orderBy(desc(submissions.receivedAt), desc(submissions.id)).limit(10)
  return rows.map(rowOf)
}

export interface SubmissionOwner { sender: string | null }

/** One submission with its refused rows; null where the caller may see none. A device sees only its own. */
export async function getSubmission(scope: Scope, id: string, { sender }: SubmissionOwner): Promise<SubmissionDetail | null> {
  return withOrganisation(scope.organisationId, async (tx) => {
    const [row] = await select(tx).where(and(inShops(scope), eq(submissions.id, id), sender === null ? undefined : eq(submissions.sender, sender)))
    if (!row) return null
    const refused = await tx.select().from(refusedRows)
      .where(and(eq(refusedRows.organisationId, scope.organisationId), eq(refusedRows.submissionId, id)))
      .orderBy(asc(refusedRows.ordinal), asc(refusedRows.reasonOrdinal)).limit(MOST_REFUSED_SHOWN + 1)
    return {
      ...rowOf(row),
      refusedRows: refused.slice(0, MOST_REFUSED_SHOWN).map(({ organisationId: _, submissionId: __, reasonOrdinal: ___, ...rest }): RefusedRow => rest),
      refusedRowsCut: refused.length > MOST_REFUSED_SHOWN,
      extraColumns: row.submission.report?.extraColumns ?? [],
      encoding: row.submission.report?.encoding ?? null,
    }
  })
}
