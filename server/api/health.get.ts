/** The process answers. */
export default apiHandler(() => ({ status: 'ok' }))
