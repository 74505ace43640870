import { readiness } from '../services/operation/readiness'

/** Database, queue and storage are usable; 503 until they are. */
export default apiHandler(async (event) => {
  const { ready, checks } = await readiness()
  if (!ready) {
    setResponseStatus(event, 503)
    setResponseHeader(event, 'retry-after', 2)
  }
  return { status: ready ? 'ok' : 'not ready', checks }
})
