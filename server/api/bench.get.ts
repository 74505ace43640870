import { z } from 'zod'
import { benchView } from '../services/readings/bench'

/** Today's work, for one shop or all of one's own. */
export default apiHandler(async (event) => {
  const member = await requireMember(event, 'readings.see')
  const { shop } = readQuery(event, z.object({ shop: z.uuid().optional() }))
  const shops = member.view.shops.filter(candidate => shop === undefined || candidate.id === shop)
  if (shops.length === 0) throw notFound()
  return benchView(member, { shopIds: shops.map(({ id }) => id), timeZone: shops[0]!.timeZone, now: new Date() })
})
