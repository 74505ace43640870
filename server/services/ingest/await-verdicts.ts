import { eq, and } from 'drizzle-orm'
import { explainVerdict } from '#shared/verdict/words'
import type { VerdictKind } from '#shared/verdict/types'
import type { RefusedRow, SubmissionDetail } from '#shared/api/intake'
import { readingIdentities, readings } from '../../database/schema/readings'
import { limitSets } from '../../database/schema/limits'
import { withOrganisation } from '../../database/tenancy'
import { listenForNews, onNews } from '../live/news'
import type { Scope } from '../readings/reading-filters'
import { getSubmission } from './list-submissions'

export interface WaitedVerdict {
  id: string
  /** The sender's own id. */
  senderId: string
  verdict: VerdictKind
  tag: string
  nextStep: string
  reason: string
  cautions: string[]
}

export interface WaitedAnswer {
  submission: Pick<SubmissionDetail, 'id' | 'status' | 'received' | 'accepted' | 'repeated' | 'refused' | 'failure'>
  readings: WaitedVerdict[]
  refused: RefusedRow[]
}

/** A device shows one next step, or a few; the rest is on the submission's address. */
const MOST_VERDICTS = 100

/**
 * Waits until the submission is settled and answers with its verdicts; null where the time runs out.
 * Nothing is held while waiting: the news of the worker's commit wakes, a slow poll is the net.
 */
export async function awaitVerdicts(scope: Scope, submissionId: string, sender: string, milliseconds: number): Promise<WaitedAnswer | null> {
  await listenForNews()
  const deadline = Date.now() + milliseconds
  let wake = () => {}
  const stop = onNews(scope.organisationId, (news) => {
    if (news.submissionId === submissionId && news.settled) wake()
  })
  try {
    for (;;) {
      const woken = new Promise<void>((resolve) => {
        wake = resolve
      })
      const submission = await getSubmission(scope, submissionId, { sender })
      if (submission && (submission.status === 'done' || submission.status === 'failed')) return answer(scope, submission)
      const left = deadline - Date.now()
      if (left <= 0) return null
      let timer: NodeJS.Timeout | undefined
      await Promise.race([woken, new Promise<void>((resolve) => {
        timer = setTimeout(resolve, Math.min(left, 1000))
      })])
      clearTimeout(timer)
    }
  } finally {
    stop()
  }
}

async function answer(scope: Scope, submission: SubmissionDetail): Promise<WaitedAnswer> {
  const { organisationId } = scope
  const rows = await withOrganisation(organisationId, tx => tx.select({ reading: readings, limits: limitSets.content })
    .from(readingIdentities)
    .innerJoin(readings, and(eq(readings.organisationId, readingIdentities.organisationId), eq(readings.sampledAt, readingIdentities.sampledAt), eq(readings.id, readingIdentities.readingId)))
    .innerJoin(limitSets, and(eq(limitSets.organisationId, readings.organisationId), eq(limitSets.version, readings.limitSetVersion)))
    .where(and(eq(readingIdentities.organisationId, organisationId), eq(readingIdentities.submissionId, submission.id)))
    .orderBy(readings.ordinal).limit(MOST_VERDICTS))
  const { id, status, received, accepted, repeated, refused, failure } = submission
  return {
    submission: { id, status, received, accepted, repeated, refused, failure },
    readings: rows.map(({ reading, limits }) => {
      const words = explainVerdict(reading.verdictDetail, { declared: reading.declared, limits, resolution: reading.resolution })
      return { id: reading.id, senderId: reading.senderReadingId, verdict: reading.verdict, tag: words.tag, nextStep: words.nextStep, reason: words.reason, cautions: words.cautions }
    }),
    refused: submission.refusedRows.slice(0, MOST_VERDICTS),
  }
}
