/** Who is signed in. */
export default apiHandler(async event => (await requireMember(event, 'signed-in')).view)
