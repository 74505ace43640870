import { endSession } from '../../services/accounts/sessions'

/** Ends one of one's own sessions. */
export default apiHandler(async (event) => {
  const member = await requireMember(event, 'signed-in')
  if (!await endSession(member, idFromPath(event), new Date())) throw notFound()
  return { ended: true }
})
