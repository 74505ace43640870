import { endSession } from '../../services/accounts/sessions'

/** Signs out: the row is ended, so a copied cookie opens nothing either. */
export default apiHandler(async (event) => {
  const member = await requireMember(event, 'signed-in')
  await endSession(member, member.sessionId, new Date())
  await clearUserSession(event)
  return { signedOut: true }
})
