import { describe, expect, it } from 'vitest'
import { canonicalReading } from '#shared/intake/canonical-reading'
import { checkRecord } from '#shared/intake/check-record'
import { INTAKE_LIMITS } from '#shared/intake/limits'
import type { PurityReading } from '#shared/intake/reading-schema'
import { decodeSubmission } from '#server/services/ingest/decode'
import { demoScenario } from '#fixtures/demo/scenario'
import type { DemoSubmission } from '#fixtures/demo/types'

const NOW = new Date('2026-12-01T17:40:00Z')
const scenario = demoScenario({ now: NOW })
const submissions = [...scenario.submissions()]
const { stories } = scenario

interface Outcome { accepted: PurityReading[], refused: string[], failure: string | null }

async function* one(bytes: Uint8Array) {
  yield bytes
}

async function takeIn({ mediaType, bytes }: DemoSubmission): Promise<Outcome> {
  const outcome: Outcome = { accepted: [], refused: [], failure: null }
  for await (const event of decodeSubmission({ mediaType, contentEncoding: null, chunks: one(bytes) }, INTAKE_LIMITS)) {
    if ('failure' in event) outcome.failure = event.failure.code
    if (!('records' in event)) continue
    for (const record of event.records) {
      const check = checkRecord(record)
      if (check.ok) outcome.accepted.push(check.reading)
      else outcome.refused.push(check.refusals.map(({ code, column }) => `${code} ${column ?? ''}`.trim()).join(', '))
    }
  }
  return outcome
}

const at = (time: Date, media: DemoSubmission['mediaType']) => submissions.find(({ receivedAt, mediaType }) => receivedAt.getTime() === time.getTime() && mediaType === media)!

describe('the submissions of the demo', { timeout: 30_000 }, () => {
  it('are few, in order of receipt, and never received before they were sampled or after now', () => {
    expect(submissions.length).toBeLessThan(1_500)
    expect(new Set(submissions.map(({ source }) => source))).toEqual(new Set(['device', 'file', 'hand']))
    expect(new Set(submissions.map(({ mediaType }) => mediaType))).toEqual(new Set(['application/json', 'application/x-ndjson', 'text/csv']))
    submissions.forEach(({ receivedAt, instrumentSerial, source, sender }, i) => {
      if (i > 0) expect(receivedAt.getTime()).toBeGreaterThanOrEqual(submissions[i - 1]!.receivedAt.getTime())
      expect(receivedAt.getTime()).toBeLessThan(NOW.getTime())
      expect(source === 'device').toBe(instrumentSerial !== null)
      expect(sender).toMatch(source === 'device' ? /^instrument:[A-Z]{2}-\d{4}$/ : source === 'file' ? /^shop:./ : /^person:.+@.+\.example$/)
    })
  })

  it('bring every good reading through intake exactly once, whatever the form', async () => {
    const expected = new Map([...scenario.organisation.readings, ...scenario.otherOrganisation.readings].map(({ reading }) => [reading.id, reading]))
    const seen = new Map<string, number>()
    for (const submission of submissions) {
      const outcome = await takeIn(submission)
      if (submission.receivedAt.getTime() === stories.refusedFile.receivedAt.getTime() || submission.receivedAt.getTime() === stories.unreadableFile.receivedAt.getTime()) continue
      expect(outcome.failure).toBeNull()
      expect(outcome.refused).toEqual([])
      for (const reading of outcome.accepted) {
        expect(Date.parse(reading.sampledAt)).toBeLessThanOrEqual(submission.receivedAt.getTime())
        if (submission.instrumentSerial !== null) expect(reading.instrument.serial).toBe(submission.instrumentSerial)
        if (canonicalReading(reading) === canonicalReading(expected.get(reading.id)!)) seen.set(reading.id, (seen.get(reading.id) ?? 0) + 1)
      }
    }
    expect(seen.size).toBe(expected.size)
    expect([...seen].filter(([, times]) => times > 1)).toEqual([[stories.sentTwice.id, 2]])
  })

  it('hold a file that cannot be read and one with refused rows', async () => {
    expect((await takeIn(at(stories.unreadableFile.receivedAt, 'text/csv'))).failure).toBe('header')
    const outcome = await takeIn(at(stories.refusedFile.receivedAt, 'text/csv'))
    expect(outcome.failure).toBeNull()
    expect(outcome.accepted).toHaveLength(stories.refusedFile.accepted)
    expect(outcome.refused).toHaveLength(stories.refusedFile.refused)
    expect(new Set(outcome.refused.map(text => text.split(' ')[0]))).toEqual(new Set(['time', 'unknown-substance', 'sum', 'missing', 'number', 'range', 'choice']))
    expect(outcome.refused.filter(text => text === 'time sampled_at')).toHaveLength(2)
  })

  it('hold one id with two contents, and one post that came twice', async () => {
    const first = scenario.organisation.readings.find(({ reading }) => reading.id === stories.conflict.id)!.reading
    const [again] = (await takeIn(at(stories.conflict.receivedAt, 'application/json'))).accepted
    expect(again!.id).toBe(first.id)
    expect(canonicalReading(again!)).not.toBe(canonicalReading(first))
    const text = (submission: DemoSubmission) => new TextDecoder().decode(submission.bytes)
    const twice = at(stories.sentTwice.receivedAt, 'application/json')
    expect(submissions.filter(submission => text(submission) === text(twice))).toHaveLength(2)
  })
})
