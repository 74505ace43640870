import { defineStore } from 'pinia'

const UUID = /^[0-9a-f]{8}(-[0-9a-f]{4}){3}-[0-9a-f]{12}$/i

/** Which shop the person looks at: one, or all of theirs (null). Kept in a cookie for the next page load. */
export const useShopsStore = defineStore('shops', () => {
  const chosen = useCookie<string | null>('coldslip-shop', {
    default: () => null,
    decode: text => text && UUID.test(text) ? text : null,
    encode: id => id ?? '',
    maxAge: 60 * 60 * 24 * 365,
    sameSite: 'lax',
    path: '/',
  })
  return { chosen }
})
