import type { TestServer } from './server'
import { PASSWORD } from './organisation'

export interface Answer<T = any> { status: number, body: T, headers: Headers }

/** Requests as a device or a browser makes them. */
export async function request<T = any>(server: TestServer, path: string, options: { method?: string, token?: string, cookie?: string, headers?: Record<string, string>, body?: string | Uint8Array, json?: unknown } = {}): Promise<Answer<T>> {
  const headers: Record<string, string> = { ...options.headers }
  if (options.token) headers.authorization = `Bearer ${options.token}`
  if (options.cookie) headers.cookie = options.cookie
  if (options.json !== undefined) headers['content-type'] ??= 'application/json'
  const response = await fetch(server.baseUrl + path, {
    method: options.method ?? (options.body === undefined && options.json === undefined ? 'GET' : 'POST'),
    headers,
    body: options.json === undefined ? options.body as BodyInit | undefined : JSON.stringify(options.json),
    redirect: 'manual',
  })
  const text = await response.text()
  let body: unknown = text
  if ((response.headers.get('content-type') ?? '').includes('json')) body = JSON.parse(text)
  return { status: response.status, body: body as T, headers: response.headers }
}

/** Signs in as the role of a test organisation. @returns the cookie. */
export async function signInAs(server: TestServer, tag: string, role: string): Promise<string> {
  const answer = await request(server, '/api/session', { json: { email: `${role}@${tag}.example`, password: PASSWORD }, headers: { 'sec-fetch-site': 'same-origin' } })
  if (answer.status !== 200) throw new Error(`Sign-in failed: ${answer.status}`)
  const cookie = answer.headers.getSetCookie().find(item => item.startsWith('coldslip-session='))
  return cookie!.split(';')[0]!
}

/** Polls until the condition holds; a missed deadline is a failure with the last value. */
export async function until<T>(look: () => Promise<T>, holds: (value: T) => boolean, milliseconds = 20_000): Promise<T> {
  const deadline = Date.now() + milliseconds
  for (;;) {
    const value = await look()
    if (holds(value)) return value
    if (Date.now() > deadline) throw new Error(`Did not come about in ${milliseconds} ms; last: ${JSON.stringify(value).slice(0, 500)}`)
    await new Promise(resolve => setTimeout(resolve, 40))
  }
}

/** Waits until a submission is settled. */
export async function settled(server: TestServer, token: string, submissionId: string) {
  const answer = await until(() => request(server, `/api/v1/submissions/${submissionId}`, { token }), ({ body }) => ['done', 'failed'].includes(body.submission?.status))
  return answer.body.submission
}
