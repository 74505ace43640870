import { readingFilters, type ReadingList, type ReadingListQuery } from '#shared/api/readings'
import { withOrganisation } from '../../database/tenancy'
import { readCursor, writeCursor } from './cursor'
import { below, conditionsOf, type Scope } from './reading-filters'
import { selectReadings } from './readings.queries'

/** The cursor is not one of these filters. */
export class WrongCursor extends Error {}

/**
 * One page of the results browser, newest first, at any depth for the same price: no offset, no count.
 *
 * @throws WrongCursor
 */
export async function listReadings(scope: Scope, query: ReadingListQuery): Promise<ReadingList> {
  const { cursor, limit, ...rest } = query
  const filters = readingFilters.parse(rest)
  const start = cursor === undefined ? null : readCursor(cursor, filters)
  if (cursor !== undefined && !start) throw new WrongCursor()
  return withOrganisation(scope.organisationId, async (tx) => {
    const conditions = await conditionsOf(tx, scope, filters)
    if (start) conditions.push(below(start))
    // One more than the page tells whether another page follows.
    const found = await selectReadings(tx, conditions, limit + 1)
    const page = found.slice(0, limit)
    const last = page.at(-1)
    return {
      readings: page.map(({ row }) => row),
      nextCursor: found.length > limit && last ? writeCursor({ sampledAt: last.stored.sampledAt, id: last.stored.id }, filters) : null,
    }
  })
}
