import { listTokens } from '../../services/instruments/tokens'

/** Device tokens of one's shops; never the tokens themselves. */
export default apiHandler(async event => listTokens(await requireMember(event, 'tokens.manage')))
