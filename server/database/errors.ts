/**
 * The ORM wraps the driver's error: SQLSTATE and constraint are on a cause, and the message of the
 * wrapper carries every parameter (addresses, digests). Nothing else in the project looks at `.code`.
 */
interface DriverError { code?: unknown, constraint_name?: unknown, cause?: unknown }

function* causes(error: unknown): Generator<DriverError> {
  let current = error
  for (let depth = 0; depth < 6 && current && typeof current === 'object'; depth++) {
    yield current as DriverError
    current = (current as DriverError).cause
  }
}

/** SQLSTATE of a database error, or the driver's own code for a lost connection; null for anything else. */
export function databaseErrorCode(error: unknown): string | null {
  for (const cause of causes(error)) if (typeof cause.code === 'string') return cause.code
  return null
}

export function violatedConstraint(error: unknown): string | null {
  for (const cause of causes(error)) if (typeof cause.constraint_name === 'string') return cause.constraint_name
  return null
}

export class DatabaseUnavailable extends Error {
  constructor(detail: string) {
    super(`The database did not answer: ${detail}`)
    this.name = 'DatabaseUnavailable'
  }
}

const connectionCodes = new Set(['CONNECT_TIMEOUT', 'CONNECTION_CLOSED', 'CONNECTION_ENDED', 'CONNECTION_DESTROYED', 'ECONNREFUSED', 'ECONNRESET', 'EPIPE', 'ETIMEDOUT'])

/** True where trying again later may help: connection lost, server starting or stopping, too many clients, serialisation, deadlock, lock or statement time-out. */
export function isPassing(error: unknown): boolean {
  if (error instanceof DatabaseUnavailable) return true
  const code = databaseErrorCode(error)
  return code !== null && (connectionCodes.has(code) || /^(08|53|57P|40|55P03|57014)/.test(code))
}

/** What a log may hold of a database error: never the message of the wrapper. */
export function describeError(error: unknown): string {
  const code = databaseErrorCode(error)
  if (code) return [code, violatedConstraint(error)].filter(Boolean).join(' ')
  return error instanceof Error ? `${error.name}: ${error.message.slice(0, 300)}` : 'unknown error'
}
