declare module '#auth-utils' {
  interface SecureSessionData {
    /** Opens the session row; only its digest is stored. */
    secret?: string
  }
}

export {}
