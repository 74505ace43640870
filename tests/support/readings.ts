import type { PurityReading } from '#shared/intake/reading-schema'

/** The good reading of the tests, with an id of its own and what else should differ. */
export function goodReading(id: string, over: Partial<PurityReading> = {}): PurityReading {
  return {
    schema: 'purity-reading/1',
    id,
    sampledAt: '2026-03-14T09:26:53-05:00',
    instrument: { serial: 'BT-1', sequence: 1 },
    subject: { kind: 'vehicle', plate: 'TST 001' },
    declared: 'R-134a',
    composition: {
      basis: 'mass', air: 'apart', resolution: 0.1,
      parts: [{ substance: 'R-134a', percent: 99.4 }, { substance: 'HC', percent: 0.6 }],
      airPercent: 2.0,
    },
    ...over,
  }
}
