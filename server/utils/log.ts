/** One JSON line an event on standard error; control characters can't break out of it. Never hand it an error's message from the ORM. */
export function log(level: 'info' | 'warn' | 'error', event: string, fields: Record<string, unknown> = {}): void {
  process.stderr.write(`${JSON.stringify({ at: new Date().toISOString(), level, event, ...fields })}\n`)
}
