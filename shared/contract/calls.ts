/** The calls of the intake contract in short; the OpenAPI document tells them in full. */
export const CALLS = [
  { method: 'POST', path: '/api/v1/readings', token: 'intake', summary: 'Send readings', meaning: 'Takes one reading, {"readings": […]}, NDJSON or CSV. Answered 202 once the bytes and their job are stored. With Prefer: wait=N (1 to 10 seconds) the answer is 200 with the verdicts, where they are ready in time.' },
  { method: 'GET', path: '/api/v1/submissions/{id}', token: 'intake', summary: 'What became of a submission', meaning: 'Status, counts, and each refused record with its place, value, reason and mend.' },
  { method: 'GET', path: '/api/v1/readings', token: 'read', summary: 'List readings', meaning: 'Newest first, by keyset cursor.' },
  { method: 'GET', path: '/api/v1/readings/{id}', token: 'read', summary: 'One reading', meaning: 'With verdict, rules, limits in force and revisions.' },
  { method: 'GET', path: '/api/v1/readings/{id}/certificate.pdf', token: 'read', summary: 'Certificate of a reading', meaning: 'As PDF on A4, or with format=letter on Letter. Where none has been issued for the reading as it stands, 404 with the code no-certificate.' },
  { method: 'GET', path: '/api/v1/readings/{id}/certificate.json', token: 'read', summary: 'Signed certificate of a reading', meaning: 'The statement and its Ed25519 signature. Public keys: /.well-known/coldslip-keys.json. To check it without this server: /certificates/check-certificate.mjs.' },
  { method: 'POST', path: '/api/v1/readings/{id}/certificate', token: 'intake and read', summary: 'Issue the certificate of a reading', meaning: 'Numbers, signs and keeps it: 201. Where the reading as it stands has one already, 200 with that one.' },
  { method: 'GET', path: '/api/verify/{code}', token: null, summary: 'Whether a certificate is genuine', meaning: 'For anybody with the code on the paper: genuine, superseded or withdrawn, and nothing private.' },
  { method: 'GET', path: '/api/health', token: null, summary: 'The process answers', meaning: 'Always 200 while it runs.' },
  { method: 'GET', path: '/api/ready', token: null, summary: 'The server can work', meaning: 'Database, queue and storage are usable; 503 until they are.' },
] as const

/** Seconds that `Prefer: wait=N` may ask for. */
export const PREFER_WAIT_SECONDS = { minimum: 1, maximum: 10 } as const

/** Characters of an Idempotency-Key. */
export const IDEMPOTENCY_KEY_LENGTH = 255
