import { revokeToken } from '../../services/instruments/tokens'

/** Revokes a device token from its next request on. */
export default apiHandler(async (event) => {
  const member = await requireMember(event, 'tokens.manage')
  if (!await revokeToken(member, { id: idFromPath(event), actor: `person:${member.personId}`, now: new Date() })) throw notFound()
  return { revoked: true }
})
