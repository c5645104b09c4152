declare module '#auth-utils' {
  interface UserSession {
    /** For display only; what counts is the session row. */
    signedInAt?: string
  }

  interface SecureSessionData {
    sessionId: string
  }
}

export {}
