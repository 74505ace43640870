import { getReading } from '../../../services/readings/get-reading'

/** One reading with verdict and revisions. */
export default apiHandler(async (event) => {
  const scope = await requireReader(event)
  const reading = await getReading(scope, idFromPath(event))
  if (!reading) throw notFound()
  return reading
})
