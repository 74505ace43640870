import { createLiveStream } from '~/utils/live-stream'

export default defineNuxtPlugin(() => ({ provide: { live: createLiveStream('/api/live') } }))
