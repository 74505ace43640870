import { awaitVerdicts } from '../../services/ingest/await-verdicts'
import { receive } from '../../services/ingest/receive'
import { keepFirstAnswer } from '../../services/ingest/first-answer'

/** Takes readings in: acknowledged when bytes and job are committed; with `Prefer: wait=N` the verdicts come at once. */
export default apiHandler(async (event) => {
  const device = await requireDevice(event, 'intake')
  requireIntakeRate(device.tokenId)
  const idempotencyKey = readIdempotencyKey(event)
  const waitSeconds = readPreferWait(event)
  const { spool, mediaType, contentEncoding } = await readIntakeBody(event)
  try {
    const sender = `instrument:${device.instrumentId}`
    const receipt = await receive({
      organisationId: device.organisationId, shopId: device.shopId, source: 'device', sender, instrumentId: device.instrumentId, personId: null,
      mediaType, contentEncoding, spool, sha256: spool.digest(), idempotencyKey, receivedAt: new Date(),
    })
    setResponseHeader(event, 'location', `/api/v1/submissions/${receipt.submissionId}`)
    if (receipt.replayed) setResponseHeader(event, 'idempotency-replayed', 'true')
    if (receipt.firstAnswer) {
      setResponseStatus(event, receipt.firstAnswer.status)
      return receipt.firstAnswer.body
    }
    const waited = waitSeconds > 0 ? await awaitVerdicts({ organisationId: device.organisationId, shopIds: [device.shopId] }, receipt.submissionId, sender, waitSeconds * 1000) : null
    if (waited) {
      setResponseHeader(event, 'preference-applied', `wait=${waitSeconds}`)
      if (idempotencyKey !== null && !receipt.replayed) await keepFirstAnswer(device.organisationId, receipt.submissionId, { status: 200, body: waited })
      return waited
    }
    setResponseStatus(event, 202)
    return { submission: { id: receipt.submissionId, status: 'received', received: 0, accepted: 0, refused: 0 } }
  } finally {
    await spool.dispose()
  }
})
