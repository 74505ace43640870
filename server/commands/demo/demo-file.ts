import { renameSync, writeFileSync } from 'node:fs'
import type { DemoPerson } from '#fixtures/demo/types'
import { createToken } from '#server/services/instruments/tokens'
import type { LoadedOrganisation } from './ensure-organisation'

/** Bench instrument that the demo token speaks for. */
const INSTRUMENT = 'HB-2041'

interface DemoFile {
  baseUrl: string
  signIns: { role: string, email: string, password: string, shop: string }[]
  deviceToken: string
  instrumentSerial: string
}

/**
 * Makes a device token and writes the sign-ins and it for the people at this machine.
 * @param strangers people of the other organisation, to see that nothing is shared
 */
export async function writeDemoFile(file: string, baseUrl: string, loaded: LoadedOrganisation, { people, strangers, now }: { people: DemoPerson[], strangers: DemoPerson[], now: Date }): Promise<void> {
  const issued = await createToken({ organisationId: loaded.organisationId, shopIds: [...loaded.shopIds.values()] }, {
    name: 'Demo bench', instrumentId: loaded.instrumentIds.get(INSTRUMENT)!, scopes: ['intake', 'read'], actor: 'system', now,
  })
  if (issued === null) throw new Error(`${INSTRUMENT} is not among the instruments of the demo`)
  const content: DemoFile = {
    baseUrl,
    signIns: [...people, ...strangers].map(({ email, password, places }) => ({
      role: places[0]!.role, email, password, shop: places.length > 2 ? 'all shops' : [...new Set(places.map(place => place.shop))].join(', '),
    })),
    deviceToken: issued.token,
    instrumentSerial: INSTRUMENT,
  }
  // Whole or not at all: a file that is there says that the demo is loaded.
  writeFileSync(`${file}.part`, `${JSON.stringify(content, null, 2)}\n`, { mode: 0o600 })
  renameSync(`${file}.part`, file)
}
