const declared = [
  'GET /api/bench', 'GET /api/demo', 'GET /api/filters', 'GET /api/health', 'GET /api/live', 'GET /api/ready',
  'GET /api/session', 'POST /api/session', 'DELETE /api/session', 'GET /api/sessions', 'DELETE /api/sessions/:id',
  'GET /api/submissions', 'GET /api/submissions/:id', 'GET /api/submissions/:id/bytes', 'POST /api/submissions/:id/retry',
  'GET /api/tokens', 'POST /api/tokens', 'DELETE /api/tokens/:id',
  'GET /api/v1/readings', 'POST /api/v1/readings', 'GET /api/v1/readings/:id', 'GET /api/v1/submissions/:id',
] as const

/** Every address under /api with its methods; a test holds it against the files. */
export const ROUTES = declared.map((route) => {
  const [method, path] = route.split(' ') as [string, string]
  return { method, path, pattern: new RegExp(`^${path.replace(/:id/g, '[^/]+')}$`) }
})
