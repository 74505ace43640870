import type { AsyncData, NuxtError, UseFetchOptions } from 'nuxt/app'
import type { Ref } from 'vue'

interface ReadOptions {
  /** One a thing that is read; with the id where there is one. */
  key: string
  query?: Ref<Record<string, string | string[]>>
}

/**
 * Reads from the API while the server draws the page and again in the browser. A session that has
 * ended leads to the sign-in page and back.
 */
export function useRead<T>(path: string, { key, query }: ReadOptions) {
  const lost = useSessionLost()
  const options: UseFetchOptions<unknown> = { key, query, deep: false, onResponseError: ({ response }) => lost(response.status) }
  // The path is not a literal, so the answer's type can't be looked up; the caller names it.
  return useFetch<unknown>(path, options) as AsyncData<T | undefined, NuxtError | undefined>
}

/** Sends to the API from the browser. @throws the answer's error, to be shown by `problemOf`. */
export function useSend() {
  const lost = useSessionLost()
  return <T>(path: string, options: { method?: 'GET' | 'POST' | 'DELETE', body?: Record<string, unknown>, query?: Record<string, unknown> } = {}): Promise<T> =>
    $fetch<T>(path, { ...options, onResponseError: ({ response }) => lost(response.status) }) as Promise<T>
}

function useSessionLost() {
  const { session, forget } = useSession()
  const router = useRouter()
  return (status: number) => {
    if (import.meta.server || status !== 401 || !session.value) return
    forget()
    void router.push({ path: '/sign-in', query: { next: router.currentRoute.value.fullPath } })
  }
}
