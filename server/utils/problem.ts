import type { H3Event } from 'h3'
import { describeError, isPassing } from '../database/errors'
import { TooManySignIns } from '../services/accounts/passwords'
import { IntakeRefused } from '../services/ingest/ingest.errors'
import { log } from './log'

const TITLES: Record<number, string> = {
  400: 'The request can\'t be understood',
  401: 'Sign in, or send a valid token',
  403: 'Not allowed',
  404: 'Not found',
  405: 'Not possible here',
  409: 'Not now',
  413: 'Too large',
  415: 'Not a kind of content that is read',
  422: 'Understood, but wrong',
  429: 'Too many requests',
  500: 'Something went wrong here',
  503: 'Not available just now',
}

export interface FieldError { pointer?: string, parameter?: string, code: string, detail: string }

/** An answer that is not a success: RFC 9457. `retryable` says whether the same request may succeed later. */
export class Problem extends Error {
  constructor(
    readonly status: number,
    readonly code: string,
    readonly detail: string,
    readonly more: { headers?: Record<string, string>, errors?: unknown[] } = {},
  ) {
    super(detail)
    this.name = 'Problem'
  }
}

export const notFound = (): Problem => new Problem(404, 'not-found', 'There is nothing here that you may see.')

/** Every failure as a problem; of an unexpected one only the kind is told, and that only to the log. */
export function problemOf(error: unknown): Problem {
  if (error instanceof Problem) return error
  if (error instanceof IntakeRefused) return new Problem(error.status, error.code, error.message, error.more)
  if (error instanceof TooManySignIns) return new Problem(503, 'busy', 'Too many people are signing in at once.', { headers: { 'retry-after': '5' } })
  if (isPassing(error)) return new Problem(503, 'unavailable', 'The database does not answer just now.', { headers: { 'retry-after': '3' } })
  const status = (error as { statusCode?: unknown } | null)?.statusCode
  if (typeof status === 'number' && status >= 400 && status < 500) return new Problem(status, 'refused', TITLES[status] ?? 'Refused')
  return new Problem(500, 'fault', 'The fault has been recorded. Try again; if it stays, tell whoever runs this server the request id.')
}

export function sendProblem(event: H3Event, error: unknown): object {
  const problem = problemOf(error)
  const requestId = event.context.requestId as string
  if (problem.status >= 500) log(problem.status === 500 ? 'error' : 'warn', 'request failed', { requestId, method: event.method, path: event.path.split('?')[0], status: problem.status, error: describeError(error) })
  setResponseStatus(event, problem.status)
  setResponseHeaders(event, { 'content-type': 'application/problem+json; charset=utf-8', 'cache-control': 'no-store', ...problem.more.headers })
  return {
    type: `/docs/intake#problem-${problem.code}`,
    title: TITLES[problem.status] ?? 'Refused',
    status: problem.status,
    detail: problem.detail,
    requestId,
    retryable: [409, 429, 503].includes(problem.status),
    ...(problem.more.errors ? { errors: problem.more.errors } : {}),
  }
}

/** Of a refused body so much is still taken in, and for so long: a sender that is cut off in the middle of sending never reads the refusal. */
const DRAINED_BYTES = 9 * 1024 * 1024
const DRAINED_MILLISECONDS = 3000

function drainBody({ node: { req: request } }: H3Event): Promise<void> {
  if (request.complete || request.destroyed || request.readableEnded) return Promise.resolve()
  return new Promise((resolve) => {
    let left = DRAINED_BYTES
    const take = (part: Buffer) => {
      left -= part.length
      if (left < 0) end()
    }
    const end = () => {
      clearTimeout(timer)
      request.off('data', take)
      request.pause()
      resolve()
    }
    const timer = setTimeout(end, DRAINED_MILLISECONDS)
    request.once('end', end)
    request.once('close', end)
    request.on('data', take)
  })
}

/** Every handler under `server/api`: answers are never cached, failures become problems. */
export function apiHandler<T>(handle: (event: H3Event) => Promise<T> | T) {
  return defineEventHandler(async (event) => {
    setResponseHeader(event, 'cache-control', 'no-store')
    try {
      return await handle(event)
    } catch (error) {
      await drainBody(event)
      return sendProblem(event, error)
    }
  })
}
