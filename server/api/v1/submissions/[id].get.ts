import { getSubmission } from '../../../services/ingest/list-submissions'

/** Status, counts and refused rows of one of the device's own submissions. */
export default apiHandler(async (event) => {
  const device = await requireDevice(event, 'intake')
  const submission = await getSubmission({ organisationId: device.organisationId, shopIds: [device.shopId] }, idFromPath(event), { sender: `instrument:${device.instrumentId}` })
  if (!submission) throw notFound()
  return { submission }
})
