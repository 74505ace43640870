import type { SessionView } from '#shared/api/session'
import { can, type Right } from '#shared/access/roles'

/**
 * Who is signed in. The session is asked for once a page load, by the auth middleware; the answer
 * travels from the server to the browser in the page's state.
 */
export function useSession() {
  const session = useState<SessionView | null>('session', () => null)
  const asked = useState<boolean>('session-asked', () => false)
  const request = useRequestFetch()

  /** @throws the answer's error unless it says that nobody is signed in. */
  async function load(): Promise<SessionView | null> {
    if (asked.value) return session.value
    try {
      session.value = await request<SessionView>('/api/session')
    } catch (error) {
      if (statusOf(error) !== 401) throw error
      session.value = null
    }
    asked.value = true
    return session.value
  }

  /** After signing in. */
  function adopt(view: SessionView) {
    session.value = view
    asked.value = true
  }

  /** After signing out, or when the server says that the session has ended. */
  function forget() {
    session.value = null
    asked.value = true
  }

  const mayI = (right: Right) => session.value !== null && can(session.value.roles, right)

  return { session, load, adopt, forget, mayI }
}
