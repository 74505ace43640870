import { openApiDocument } from '#shared/contract/openapi'

/** The OpenAPI 3.1 document, made from the definition that validates. */
export default defineEventHandler((event) => {
  setResponseHeaders(event, { 'content-type': 'application/json; charset=utf-8', 'cache-control': 'public, max-age=300', 'access-control-allow-origin': '*', 'cross-origin-resource-policy': 'cross-origin' })
  return openApiDocument({ baseUrl: getRequestURL(event).origin })
})
