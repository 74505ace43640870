import { randomUUID } from 'node:crypto'

/** Every request has an id of our own making; it stands in problems and in the log. */
export default defineEventHandler((event) => {
  const requestId = randomUUID()
  event.context.requestId = requestId
  setResponseHeader(event, 'x-request-id', requestId)
})
