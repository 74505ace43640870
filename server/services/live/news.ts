import { EventEmitter } from 'node:events'
import { z } from 'zod'
import { bulkClient } from '../../database/client'
import { NEWS_CHANNEL } from '../../database/queue/definitions'

const newsSchema = z.object({
  organisationId: z.string(),
  submissionId: z.string(),
  readingIds: z.array(z.string()),
  count: z.number(),
  settled: z.boolean(),
})
/** What a worker's commit tells: ids only, since any process of the database could listen. */
export type News = z.infer<typeof newsSchema>

const emitter = new EventEmitter().setMaxListeners(0)
let listening: Promise<unknown> | null = null

/** One LISTEN connection a process; the driver takes it up again after a lost connection. */
export function listenForNews(): Promise<unknown> {
  listening ??= bulkClient().listen(NEWS_CHANNEL, (payload) => {
    const news = newsSchema.safeParse(JSON.parse(payload))
    if (news.success) emitter.emit(news.data.organisationId, news.data)
  })
  return listening
}

/** @returns a function that ends it. */
export function onNews(organisationId: string, listener: (news: News) => void): () => void {
  emitter.on(organisationId, listener)
  return () => emitter.off(organisationId, listener)
}
