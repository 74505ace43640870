import type { UseFetchOptions } from 'nuxt/app'

/**
 * Reads from the API while the server draws the page and again in the browser. A session that has
 * ended leads to the sign-in page and back.
 */
export function useRead<T>(path: string | (() => string), options: { key: string | (() => string), query?: UseFetchOptions<T>['query'], lazy?: boolean }) {
  const lost = useSessionLost()
  return useFetch<T>(path, {
    key: options.key as string,
    query: options.query,
    lazy: options.lazy ?? false,
    deep: false,
    onResponseError: ({ response }) => lost(response.status),
  } as UseFetchOptions<T>)
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
