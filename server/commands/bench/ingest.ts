import { spawn } from 'node:child_process'
import { createHash } from 'node:crypto'
import { createReadStream, createWriteStream } from 'node:fs'
import { mkdtemp, rm, stat } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { pipeline } from 'node:stream/promises'
import postgres from 'postgres'
import { createOrganisation } from '#server/services/accounts/create-organisation'
import { closePools } from '#server/database/client'
import { withOrganisationBulk } from '#server/database/tenancy'
import { uuidV7 } from '#server/services/ids/uuid-v7'
import { processSubmission } from '#server/services/ingest/process-submission'
import { inRotation, median, printRatios, type BenchDatabase } from './measure'

const ROWS = Number(process.env.BENCH_ROWS ?? 150_000)
const ROUNDS = Number(process.env.BENCH_ROUNDS ?? 3)
const CHUNK = 1024 * 1024

/** A CSV file of plausible readings: 20,000 vehicles over a year, one in fifteen contaminated. */
function csvOf(rows: number, round: number): Buffer {
  const lines = ['id,sampled_at,instrument_serial,sequence,subject_kind,plate,work_order,declared,basis,air,resolution,r134a_pct,hc_pct,r22_pct,air_pct,ambient_c,pressure_kpa,pressure_kind,operator,batch']
  let seed = 20261201 + round
  const random = () => {
    seed = (Math.imul(seed, 1664525) + 1013904223) >>> 0
    return seed / 2 ** 32
  }
  const start = Date.UTC(2025, 10, 1)
  for (let i = 0; i < rows; i++) {
    const at = new Date(start + Math.floor((i / rows) * 365 * 86_400_000)).toISOString()
    const foul = random() < 1 / 15
    const hc = foul && random() < 0.3 ? 30 + Math.floor(random() * 40) : Math.floor(random() * 4)
    const r22 = foul ? Math.floor(random() * 60) : 0
    const air = Math.floor(random() * 25)
    const pct = (tenths: number) => (tenths / 10).toFixed(1)
    lines.push(`bench-${round}-${i},${at},BN-${i % 4},${i},vehicle,BN ${Math.floor(random() * 20_000)},WO-${Math.floor(i / 2)},R-134a,mass,apart,0.1,${pct(1000 - hc - r22)},${pct(hc)},${pct(r22)},${pct(air)},${pct(150 + Math.floor(random() * 150))},${500 + Math.floor(random() * 200)},gauge,op${i % 7},day ${at.slice(0, 10)}`)
  }
  return Buffer.from(lines.join('\n'))
}

/** Whole pipeline rows/s (decode, validate, normalise, match, deduplicate, verdict, rollups, audit) against plain `COPY` of the same rows into the same table. */
export async function run({ ownerUrl }: BenchDatabase): Promise<void> {
  const owner = postgres(ownerUrl, { max: 1, onnotice: () => {} })
  const folder = await mkdtemp(join(tmpdir(), 'coldslip-bench-'))
  const uncertainty = { default: { absolutePercent: 0.2, relative: 0 } }
  const organisation = await createOrganisation({
    name: 'Bench', demo: false, since: new Date('2020-01-01T00:00:00Z'), shops: [{ name: 'Bench', timeZone: 'America/Chicago' }], people: [],
    instruments: Array.from({ length: 4 }, (_, i) => ({
      serial: `BN-${i}`, model: '', shop: 'Bench', uncertainty, calibrationDueAt: null, filterChangedAt: null, filterLifeSamples: null,
      ambientMinimumCelsius: 10, ambientMaximumCelsius: 49, warmUpSeconds: 60, zeroSeconds: 20, sampleSeconds: 60,
    })),
  }, new Date())
  const { organisationId } = organisation
  const shopId = organisation.shopIds.get('Bench')!

  const deliver = async (bytes: Buffer): Promise<string> => {
    const id = uuidV7(Date.now())
    await withOrganisationBulk(organisationId, async (tx) => {
      await tx`
        insert into submissions (organisation_id, id, shop_id, source, sender, media_type, byte_length, sha256, received_at)
        values (${organisationId}, ${id}, ${shopId}, 'file', ${`shop:${shopId}`}, 'text/csv', ${bytes.length}, ${createHash('sha256').update(bytes).digest()}, now())`
      for (let at = 0, ordinal = 0; at < bytes.length; at += CHUNK, ordinal++) {
        await tx`insert into submission_chunks (organisation_id, submission_id, ordinal, bytes) values (${organisationId}, ${id}, ${ordinal}, ${bytes.subarray(at, at + CHUNK)})`
      }
    })
    return id
  }
  const clear = () => owner.unsafe('truncate readings, reading_identities, reading_rollups, refused_rows, submission_chunks, submissions, work_orders, vehicles cascade; checkpoint')

  let round = 0
  let peakMegabytes = 0
  const pipelineRate = async () => {
    await clear()
    const bytes = csvOf(ROWS, round++)
    const submissionId = await deliver(bytes)
    const watch = setInterval(() => {
      peakMegabytes = Math.max(peakMegabytes, process.memoryUsage().rss / 1024 / 1024)
    }, 50)
    const start = performance.now()
    await processSubmission({ organisationId, submissionId })
    const seconds = (performance.now() - start) / 1000
    clearInterval(watch)
    const [row] = await owner`select accepted_count as accepted, refused_count as refused, status from submissions where id = ${submissionId}`
    if (row!.accepted !== ROWS) throw new Error(`Not all were taken: ${JSON.stringify(row)}`)
    return ROWS / seconds
  }

  // Round 0 warms up and makes the partitions; its rows are what COPY gets.
  console.log(`${ROWS} rows; warming up`)
  await pipelineRate()
  const dump = join(folder, 'readings.copy')
  await pipeline(await owner`copy (select * from readings order by sampled_at) to stdout`.readable(), createWriteStream(dump))
  const bytes = (await stat(dump)).size
  const copyRate = async () => {
    await clear()
    const start = performance.now()
    await psqlCopy(ownerUrl, dump)
    return ROWS / ((performance.now() - start) / 1000)
  }
  const results = await inRotation(ROUNDS, { 'COPY into the same table': copyRate, 'whole pipeline': pipelineRate })
  printRatios(`Ingest, ${ROWS} rows of ${Math.round(bytes / ROWS)} bytes`, results, 'COPY into the same table')
  console.log(`  peak memory of the process that generates and works: ${peakMegabytes.toFixed(0)} MiB (median rows/s ${median(results['whole pipeline']!).toFixed(0)})`)
  await owner.end()
  await closePools()
  await rm(folder, { recursive: true })
}

function psqlCopy(url: string, file: string): Promise<void> {
  return new Promise((resolve, reject) => {
    const psql = spawn('psql', [url, '-qXc', 'copy readings from stdin'], { stdio: ['pipe', 'inherit', 'inherit'] })
    psql.on('error', reject)
    psql.on('close', code => (code === 0 ? resolve() : reject(new Error(`psql ended with ${code}`))))
    createReadStream(file, { highWaterMark: CHUNK }).pipe(psql.stdin)
  })
}
