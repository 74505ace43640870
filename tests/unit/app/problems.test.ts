import { expect, it } from 'vitest'
import { problemOf, statusOf } from '../../../app/utils/problems'

it('shows what problem+json says', () => {
  expect(problemOf({ statusCode: 429, data: { title: 'Too many tries', detail: 'Wait 30 s.' } })).toEqual({ status: 429, title: 'Too many tries', detail: 'Wait 30 s.' })
})

it('says what to do where the answer has no words', () => {
  expect(problemOf({ statusCode: 403 }).detail).toContain('role')
  expect(problemOf({ statusCode: 500, data: '<html>' })).toMatchObject({ status: 500, title: 'The server answered 500' })
})

it('tells a missing network from an answer', () => {
  expect(problemOf(new TypeError('fetch failed'))).toMatchObject({ status: 0, title: 'No answer from the server' })
  expect(statusOf(null)).toBe(0)
})
