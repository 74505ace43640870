import { createTokenBody } from '#shared/api/session'
import { createToken, listTokens } from '../../services/instruments/tokens'

/** Makes a device token; the answer is the only time it is shown. */
export default apiHandler(async (event) => {
  const member = await requireMember(event, 'tokens.manage')
  const { name, instrumentId, scopes } = await readJsonBody(event, createTokenBody)
  const made = await createToken(member, { name, instrumentId, scopes, actor: `person:${member.personId}`, now: new Date() })
  if (!made) throw notFound()
  setResponseStatus(event, 201)
  return { token: made.token, row: (await listTokens(member)).find(row => row.id === made.id) }
})
