import { readFile } from 'node:fs/promises'
import { settings } from '../settings'

/** Demo sign-ins, only where demo data is loaded and only this machine can ask. */
export default apiHandler(async () => {
  const { demoFile, loopbackOnly } = settings()
  if (!demoFile || !loopbackOnly) throw notFound()
  const text = await readFile(demoFile, 'utf8').catch(() => null)
  if (text === null) throw notFound()
  const { signIns } = JSON.parse(text) as { signIns: unknown }
  return { demo: true, signIns }
})
