import { readingListQuery } from '#shared/api/readings'
import { listReadings, WrongCursor } from '../../services/readings/list-readings'

/** Readings, newest first, by keyset cursor. */
export default apiHandler(async (event) => {
  const scope = await requireReader(event)
  const query = readQuery(event, readingListQuery)
  try {
    return await listReadings(scope, query)
  } catch (error) {
    if (error instanceof WrongCursor) throw new Problem(400, 'cursor', 'The cursor does not belong to these filters. Begin without one.', { errors: [{ parameter: 'cursor', code: 'cursor', detail: 'Not a cursor of these filters.' }] })
    throw error
  }
})
