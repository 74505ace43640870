import { listenForNews, onNews } from '../services/live/news'
import { streams } from '../utils/streams'

const HEARTBEAT_SECONDS = 15
/** A stream is ended after this long and taken up again by the browser, so that a signed-out one does not go on. */
const MOST_MINUTES = 10

/** New readings as they are written: ids only; the page asks for what it shows. */
export default apiHandler(async (event) => {
  const member = await requireMember(event, 'readings.see')
  await listenForNews()
  const stream = createEventStream(event)
  const stop = onNews(member.organisationId, (news) => {
    void stream.push({ event: 'readings', data: JSON.stringify({ submissionId: news.submissionId, readingIds: news.readingIds, count: news.count, settled: news.settled }) })
  })
  const beat = setInterval(() => void stream.push({ event: 'beat', data: '' }), HEARTBEAT_SECONDS * 1000)
  const end = () => void stream.close()
  const old = setTimeout(end, MOST_MINUTES * 60_000)
  streams.add(end)
  stream.onClosed(async () => {
    stop()
    clearInterval(beat)
    clearTimeout(old)
    streams.delete(end)
  })
  void stream.push({ event: 'beat', data: '', retry: 2000 })
  return stream.send()
})
