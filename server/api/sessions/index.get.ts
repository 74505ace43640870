import { listSessions } from '../../services/accounts/sessions'

/** One's own open sessions. */
export default apiHandler(async event => listSessions(await requireMember(event, 'signed-in'), new Date()))
