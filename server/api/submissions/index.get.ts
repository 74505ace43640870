import { z } from 'zod'
import { listSubmissions } from '../../services/ingest/list-submissions'

const query = z.object({
  cursor: z.string().regex(/^\d{1,15}\.[0-9a-f-]{36}$/, 'Not a cursor').optional(),
  /** `1`: only deliveries with a refused record, and those that could not be read. */
  refused: z.literal('1').optional(),
})

/** What came in, newest first. */
export default apiHandler(async (event) => {
  const member = await requireMember(event, 'intake.see')
  const { cursor, refused } = readQuery(event, query)
  const [time, id] = cursor?.split('.') ?? []
  return listSubmissions(member, { cursor: time && id ? { receivedAt: new Date(Number(time)), id } : null, onlyRefused: refused !== undefined })
})
