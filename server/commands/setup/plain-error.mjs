/** A fault that the newcomer can mend: its message is one clear sentence and is shown without a stack. */
export class PlainError extends Error {}
