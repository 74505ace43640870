/** A delivery that was refused at the door: nothing of it is stored. */
export class IntakeRefused extends Error {
  constructor(
    readonly status: 400 | 409 | 413 | 415 | 422 | 429 | 503,
    readonly code: string,
    message: string,
    readonly more: { headers?: Record<string, string>, errors?: unknown[] } = {},
  ) {
    super(message)
    this.name = 'IntakeRefused'
  }
}

/** Somebody else has taken the submission up, or settled it: this run stops without a trace. */
export class Fenced extends Error {
  constructor() {
    super('The submission was taken up by another worker')
    this.name = 'Fenced'
  }
}
