import { certificatesOfReading } from '../../../services/certificates/certificates.queries'

/** All certificates of a reading, the latest first. */
export default apiHandler(async (event) => {
  const member = await requireMember(event, 'readings.see')
  const found = await certificatesOfReading(member, idFromPath(event))
  if (!found) throw notFound()
  return found.map(({ row }) => row)
})
