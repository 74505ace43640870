import { closePools } from '../database/client'
import { describeError } from '../database/errors'
import { startBoss, stopBoss } from '../database/queue/boss'
import { started } from '../services/operation/readiness'
import { settings } from '../settings'
import { log } from '../utils/log'
import { streams } from '../utils/streams'

/** Starts queue and workers after the server; readiness tells when they are there. Plugins are not awaited, and an error in one stops nothing, so a failure here ends the process. */
export default defineNitroPlugin((nitro) => {
  let stopSweeping = () => {}
  void (async () => {
    try {
      const { servesWeb, runsWorker, sessionPassword } = settings()
      if (servesWeb && !sessionPassword) throw new Error('Settings: NUXT_SESSION_PASSWORD is missing')
      if (runsWorker) {
        const work = await import('../jobs/work')
        await work.startWorkers()
        stopSweeping = work.stopSweeping
      } else if (servesWeb) await startBoss({ supervise: false })
      started.queue = true
    } catch (error) {
      started.failure = describeError(error)
      log('error', 'start failed', { error: started.failure })
      process.exit(1)
    }
  })()

  const end = () => {
    stopSweeping()
    for (const close of streams) close()
  }
  // Before the server drains: an open event stream would hold it for the whole time-out.
  process.once('SIGTERM', end)
  process.once('SIGINT', end)
  nitro.hooks.hook('close', async () => {
    end()
    await stopBoss()
    await closePools()
  })
})
