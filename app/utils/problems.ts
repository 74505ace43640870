/** What a refused request says, as problem+json carries it (RFC 9457). */
export interface ProblemView {
  status: number
  title: string
  detail: string
}

interface Refused {
  status?: number
  statusCode?: number
  data?: { title?: unknown, detail?: unknown }
}

/** HTTP status of a failed request; 0 where no answer came. */
export function statusOf(error: unknown): number {
  const refused = error as Refused | null
  return refused?.statusCode ?? refused?.status ?? 0
}

/** What to show for a failed request, and what to do about it. */
export function problemOf(error: unknown): ProblemView {
  const status = statusOf(error)
  const data = (error as Refused | null)?.data
  if (typeof data?.title === 'string') {
    return { status, title: data.title, detail: typeof data.detail === 'string' ? data.detail : adviceFor(status) }
  }
  return { status, title: status === 0 ? 'No answer from the server' : `The server answered ${status}`, detail: adviceFor(status) }
}

function adviceFor(status: number): string {
  if (status === 0) return 'Check the network of this device, then try again. Nothing that was recorded is lost.'
  if (status === 401) return 'Sign in again, then repeat the step.'
  if (status === 403) return 'Your role in this shop does not include this. The shop owner can change it.'
  if (status === 404) return 'It does not exist, or belongs to another organisation.'
  if (status === 429) return 'Too many tries in a short time. Wait a minute, then try again.'
  return 'Try again in a minute. If it stays, tell the person who runs the server.'
}
