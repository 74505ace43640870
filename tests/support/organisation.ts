import { createOrganisation, type CreatedOrganisation, type NewOrganisation } from '#server/services/accounts/create-organisation'
import { createToken } from '#server/services/instruments/tokens'

export const PASSWORD = 'a long enough test password'

/** An invented organisation with one shop, one person of each role and one instrument. `tag` keeps two of them apart. */
export function testOrganisation(tag: string): NewOrganisation {
  const shop = `Shop ${tag}`
  return {
    name: `Organisation ${tag}`,
    demo: false,
    since: new Date('2020-01-01T00:00:00Z'),
    shops: [{ name: shop, timeZone: 'America/Chicago' }],
    people: (['technician', 'advisor', 'quality', 'owner'] as const).map(role => ({
      name: `${role} ${tag}`, email: `${role}@${tag}.example`, password: PASSWORD, places: [{ shop, role }],
    })),
    instruments: [{
      serial: 'BT-1', model: 'Invented bench unit', shop, uncertainty: { default: { absolutePercent: 0.15, relative: 0 } },
      calibrationDueAt: new Date('2090-01-01T00:00:00Z'), filterChangedAt: null, filterLifeSamples: null,
      ambientMinimumCelsius: 10, ambientMaximumCelsius: 49, warmUpSeconds: 60, zeroSeconds: 20, sampleSeconds: 60,
    }],
  }
}

export interface TestOrganisation extends CreatedOrganisation {
  tag: string
  shopId: string
  instrumentId: string
  /** Token of the instrument with the scopes asked for. */
  token: string
}

export async function makeOrganisation(tag: string, scopes: string[] = ['intake']): Promise<TestOrganisation> {
  const now = new Date()
  const created = await createOrganisation(testOrganisation(tag), now)
  const shopId = [...created.shopIds.values()][0]!
  const instrumentId = created.instrumentIds.get('BT-1')!
  const made = await createToken({ organisationId: created.organisationId, shopIds: [shopId] }, { name: 'bench', instrumentId, scopes, actor: 'system', now })
  return { ...created, tag, shopId, instrumentId, token: made!.token }
}
