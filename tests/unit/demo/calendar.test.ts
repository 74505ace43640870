import { describe, expect, it } from 'vitest'
import { ShopCalendar } from '#fixtures/demo/calendar'
import { randomStream } from '#fixtures/demo/random'

const HOURS = { weekday: [450, 1050], saturday: null } as const
const DAY = 86_400_000

describe('a shop\'s calendar', () => {
  it('finds instants on both sides of the change of the clocks', () => {
    const calendar = new ShopCalendar('America/Chicago', Date.parse('2026-12-01T18:00:00Z'), HOURS)
    const day = (text: string) => Date.parse(text) / DAY
    // 2026: summer time from 8 March to 1 November.
    expect(new Date(calendar.instant(day('2026-03-07'), 540)).toISOString()).toBe('2026-03-07T15:00:00.000Z')
    expect(new Date(calendar.instant(day('2026-03-08'), 540)).toISOString()).toBe('2026-03-08T14:00:00.000Z')
    expect(calendar.text(calendar.instant(day('2026-10-31'), 540))).toBe('2026-10-31T09:00:00-05:00')
    expect(calendar.text(calendar.instant(day('2026-11-01'), 540))).toBe('2026-11-01T09:00:00-06:00')
  })

  it('ends today a little before now, also on a day when the shop is closed', () => {
    const sunday = new ShopCalendar('America/Chicago', Date.parse('2026-11-29T18:00:00Z'), HOURS)
    expect(sunday.weekday(sunday.today)).toBe(0)
    expect(sunday.working(sunday.today)).toEqual([450, 714])
    expect(sunday.working(sunday.today - 7)).toBeNull()
    const beforeDawn = new ShopCalendar('America/Chicago', Date.parse('2026-12-01T09:30:00Z'), HOURS)
    expect(beforeDawn.date(beforeDawn.today)).toBe('2026-12-01')
    expect(beforeDawn.working(beforeDawn.today)).toEqual([0, 204])
    const midnight = new ShopCalendar('America/Chicago', Date.parse('2026-12-01T06:20:00Z'), HOURS)
    expect(midnight.date(midnight.today)).toBe('2026-11-30')
    expect(midnight.working(midnight.today)).toEqual([450, 1050])
  })
})

describe('the random stream', () => {
  it('repeats for the same seed and label only', () => {
    const draw = (seed: number, label: string) => { const random = randomStream(seed, label); return Array.from({ length: 5 }, random.unit) }
    expect(draw(1, 'a')).toEqual(draw(1, 'a'))
    expect(draw(1, 'a')).not.toEqual(draw(1, 'b'))
    expect(draw(1, 'a')).not.toEqual(draw(2, 'a'))
  })

  it('has the moments that it should', () => {
    const random = randomStream(3, 'moments')
    const many = 20_000
    const mean = (draw: () => number) => Array.from({ length: many }, draw).reduce((sum, value) => sum + value, 0) / many
    expect(mean(random.unit)).toBeCloseTo(0.5, 1)
    expect(mean(random.normal)).toBeCloseTo(0, 1)
    expect(mean(() => random.normal() ** 2)).toBeCloseTo(1, 1)
    expect(mean(() => random.poisson(3))).toBeCloseTo(3, 0)
    expect(mean(() => random.integer(1, 3))).toBeCloseTo(2, 1)
  })
})
