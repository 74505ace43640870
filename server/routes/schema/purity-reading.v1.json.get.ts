import { purityReadingJsonSchema } from '#shared/contract/reading-json-schema'

/** The JSON Schema of a reading, made from the definition that validates. */
export default defineEventHandler((event) => {
  setResponseHeaders(event, { 'content-type': 'application/schema+json; charset=utf-8', 'cache-control': 'public, max-age=300', 'access-control-allow-origin': '*', 'cross-origin-resource-policy': 'cross-origin' })
  return purityReadingJsonSchema()
})
