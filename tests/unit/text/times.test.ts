import { expect, it } from 'vitest'
import { dayIn, longDayIn, longStampIn, stampIn, timeIn, zoneText } from '#shared/text/times'

// The tests run in Asia/Kathmandu (UTC+5:45): a local time slipping in would show.
it('tells the day and the time of the shop, not of the machine', () => {
  expect(stampIn('2026-11-30T23:30:00Z', 'Europe/Berlin')).toBe('2026-12-01 00:30')
  expect(stampIn('2026-11-30T23:30:00Z', 'America/Denver')).toBe('2026-11-30 16:30')
  expect(dayIn('2026-11-30T23:30:00Z', 'UTC')).toBe('2026-11-30')
  expect(timeIn('2026-11-30T23:30:00Z', 'Asia/Kolkata')).toBe('05:00')
})

it('follows summer time', () => {
  expect(timeIn('2026-03-29T00:59:00Z', 'Europe/Berlin')).toBe('01:59')
  expect(timeIn('2026-03-29T01:00:00Z', 'Europe/Berlin')).toBe('03:00')
})

it('writes midnight as 00, not 24', () => {
  expect(longStampIn('2026-07-05T22:00:00Z', 'Europe/Berlin')).toBe('6 Jul 2026, 00:00:00')
  expect(longDayIn('2026-07-05T22:00:00Z', 'Europe/Berlin')).toBe('6 Jul 2026')
})

it('names the zone by its place', () => {
  expect(zoneText('America/New_York')).toBe('New York time')
  expect(zoneText('UTC')).toBe('UTC')
})
