import { READING_SCHEMA, type PurityReading } from '../intake/reading-schema'

/** Invented vehicle; the check digit of its number is valid. */
export const exampleReading: PurityReading = {
  schema: READING_SCHEMA,
  id: 'example-000123',
  sampledAt: '2026-03-14T09:26:53-05:00',
  instrument: { serial: 'HB-2041', sequence: 123 },
  subject: { kind: 'vehicle', vin: 'ZZ0TST003S0000123', plate: 'TST 001', workOrder: 'WO-1877', port: 'low' },
  declared: 'R-134a',
  composition: {
    basis: 'mass',
    air: 'apart',
    resolution: 0.1,
    parts: [
      { substance: 'R-134a', percent: 99.8 },
      { substance: 'R-1234yf', percent: 0.2 },
      { substance: 'HC', percent: 0.3, qualifier: '<' },
    ],
    airPercent: 2,
  },
  conditions: { ambientCelsius: 21.5, pressureKilopascal: 596, pressureKind: 'gauge' },
  operator: 'mw',
  batch: '2026-03-14 morning',
  note: '',
}

const cylinderReading: PurityReading = {
  schema: READING_SCHEMA,
  id: 'example-000124',
  sampledAt: '2026-03-14T14:41:07Z',
  instrument: { serial: 'HB-2041', sequence: 124 },
  subject: { kind: 'cylinder', tag: 'CY-07' },
  declared: 'R-1234yf',
  composition: { basis: 'mass', air: 'within', resolution: 0.1, parts: [{ substance: 'R-1234yf', percent: 98.5 }, { substance: 'HC', percent: 1.1 }], airPercent: 0.4 },
}

export const exampleJson = JSON.stringify(exampleReading, null, 2)

export const exampleNdjson = `${JSON.stringify(exampleReading)}\n${JSON.stringify(cylinderReading)}\n`

export const exampleCsv = [
  'id;sampled_at;instrument_serial;sequence;subject_kind;vin;plate;work_order;cylinder;declared;basis;air;resolution;r134a_pct;r1234yf_pct;hc_pct;air_pct;ambient_c;note',
  'example-000125;2026-03-14T10:02:11-05:00;HB-2041;125;vehicle;;TST 002;WO-1878;;R-134a;mass;apart;0,1;99,9;0,1;<0,3;1,2;22,0;"second try; ""slow"" sample"',
  'example-000126;2026-03-14T10:09:40-05:00;HB-2041;126;cylinder;;;;CY-07;R-1234yf;mass;within;0,1;;98,5;1,1;0,4;22,0;',
  '',
].join('\r\n')
