const declared = [
  'GET /api/bench', 'POST /api/certificates/:id/withdraw', 'GET /api/demo', 'GET /api/filters', 'GET /api/health', 'GET /api/live', 'GET /api/ready', 'GET /api/readings/:id/certificates',
  'GET /api/session', 'POST /api/session', 'DELETE /api/session', 'GET /api/sessions', 'DELETE /api/sessions/:id',
  'GET /api/submissions', 'GET /api/submissions/:id', 'GET /api/submissions/:id/bytes', 'POST /api/submissions/:id/retry',
  'GET /api/tokens', 'POST /api/tokens', 'DELETE /api/tokens/:id',
  'GET /api/v1/readings', 'POST /api/v1/readings', 'GET /api/v1/readings/:id',
  'POST /api/v1/readings/:id/certificate', 'GET /api/v1/readings/:id/certificate.json', 'GET /api/v1/readings/:id/certificate.pdf', 'GET /api/v1/submissions/:id',
  'GET /api/verify/:code',
] as const

/** Every address under /api with its methods; a test holds it against the files. */
export const ROUTES = declared.map((route) => {
  const [method, path] = route.split(' ') as [string, string]
  return { method, path, pattern: new RegExp(`^${path.replaceAll('.', '\\.').replace(/:\w+/g, '[^/]+')}$`) }
})
