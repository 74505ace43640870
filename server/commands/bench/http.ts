import { once } from 'node:events'
import { spawn } from 'node:child_process'
import { existsSync } from 'node:fs'
import { createServer } from 'node:http'
import { fileURLToPath } from 'node:url'
import autocannon from 'autocannon'
import postgres from 'postgres'
import { closePools } from '#server/database/client'
import { createOrganisation } from '#server/services/accounts/create-organisation'
import { createToken } from '#server/services/instruments/tokens'
import { freePort } from '../setup/ports.mjs'
import { inRotation, printRatios, type BenchDatabase } from './measure'

const CONNECTIONS = 50
const SECONDS = Number(process.env.BENCH_SECONDS ?? 8)
const ROUNDS = Number(process.env.BENCH_ROUNDS ?? 3)
const SERVER = fileURLToPath(new URL('../../../.output/server/index.mjs', import.meta.url))

let next = 0
const reading = () => JSON.stringify({
  schema: 'purity-reading/1', id: `bench-${process.pid}-${next++}`, sampledAt: new Date().toISOString(), instrument: { serial: 'BN-1', sequence: next },
  subject: { kind: 'vehicle', plate: `BN ${next % 5000}` }, declared: 'R-134a',
  composition: { basis: 'mass', air: 'apart', resolution: 0.1, parts: [{ substance: 'R-134a', percent: 99.7 }, { substance: 'HC', percent: 0.3 }], airPercent: 0.8 },
})

async function load(url: string, headers: Record<string, string>): Promise<autocannon.Result> {
  const result = await autocannon({
    url, connections: CONNECTIONS, duration: SECONDS, method: 'POST', headers: { 'content-type': 'application/json', ...headers },
    setupClient: client => client.setBody(reading()),
    requests: [{ method: 'POST', setupRequest: request => ({ ...request, body: reading() }) }],
  })
  if (result.errors > 0 || result.non2xx > 0) throw new Error(`${result.errors} errors, ${result.non2xx} answers that are no success`)
  return result
}

/** Single-POST requests/s, acknowledged only after the commit of bytes and job, against a bare handler doing one INSERT. */
export async function run({ ownerUrl, applicationUrl }: BenchDatabase): Promise<void> {
  if (!existsSync(SERVER)) throw new Error('Build first: npm run build')
  const owner = postgres(ownerUrl, { max: 1, onnotice: () => {} })
  const now = new Date()
  const organisation = await createOrganisation({
    name: 'Bench', demo: false, since: new Date('2020-01-01T00:00:00Z'), shops: [{ name: 'Bench', timeZone: 'UTC' }], people: [],
    instruments: [{
      serial: 'BN-1', model: '', shop: 'Bench', uncertainty: { default: { absolutePercent: 0.2, relative: 0 } }, calibrationDueAt: null, filterChangedAt: null, filterLifeSamples: null,
      ambientMinimumCelsius: 10, ambientMaximumCelsius: 49, warmUpSeconds: 60, zeroSeconds: 20, sampleSeconds: 60,
    }],
  }, now)
  const shopId = organisation.shopIds.get('Bench')!
  const scope = { organisationId: organisation.organisationId, shopIds: [shopId] }
  const token = (await createToken(scope, { name: 'bench', instrumentId: organisation.instrumentIds.get('BN-1')!, scopes: ['intake'], actor: 'system', now }))!.token

  await owner.unsafe('create table bare (id bigint generated always as identity primary key, body bytea not null, at timestamptz not null default now())')
  const pool = postgres(ownerUrl, { max: 10 })
  const bare = createServer((request, response) => {
    const parts: Buffer[] = []
    request.on('data', (part: Buffer) => parts.push(part))
    request.on('end', () => {
      pool`insert into bare (body) values (${Buffer.concat(parts)})`.then(() => response.writeHead(202, { 'content-type': 'application/json' }).end('{}'), () => response.writeHead(500).end())
    })
  })
  const barePort = await freePort()
  bare.listen(barePort, '127.0.0.1')
  await once(bare, 'listening')

  const port = await freePort()
  const child = spawn(process.execPath, [SERVER], { stdio: ['ignore', 'ignore', 'inherit'], env: { ...process.env, DATABASE_URL: applicationUrl, HOST: '127.0.0.1', PORT: String(port), COLDSLIP_ROLE: 'web', COLDSLIP_INTAKE_PER_MINUTE: '10000000', NUXT_SESSION_PASSWORD: 'only-for-the-bench-only-for-the-bench' } })
  const intake = `http://127.0.0.1:${port}/api/v1/readings`
  while (!(await fetch(`http://127.0.0.1:${port}/api/ready`).then(answer => answer.ok, () => false))) await new Promise(resolve => setTimeout(resolve, 100))

  const latencies: Record<string, number[]> = { bare: [], intake: [] }
  const rate = async (name: string, url: string, headers: Record<string, string>) => {
    const result = await load(url, headers)
    latencies[name]!.push(result.latency.p99)
    return result.requests.average
  }
  const contestants = {
    'bare handler, one INSERT': () => rate('bare', `http://127.0.0.1:${barePort}/`, {}),
    'intake, bytes and job committed': () => rate('intake', intake, { authorization: `Bearer ${token}` }),
  }
  console.log(`${CONNECTIONS} connections, ${SECONDS} s each; warming up`)
  for (const contestant of Object.values(contestants)) await contestant()
  for (const list of Object.values(latencies)) list.length = 0
  const [before] = await owner<{ n: number }[]>`select count(*)::int as n from submissions`
  const results = await inRotation(ROUNDS, contestants)
  const [after] = await owner<{ n: number, jobs: number }[]>`select count(*)::int as n, (select count(*)::int from pgboss.job where name = 'intake') as jobs from submissions`
  printRatios('One reading a POST', results, 'bare handler, one INSERT')
  console.log(`  p99 ms: bare ${latencies.bare!.join(', ')}; intake ${latencies.intake!.join(', ')}`)
  console.log(`  stored ${after!.n - before!.n} submissions in the rounds, ${after!.jobs} jobs in all for ${after!.n} submissions`)
  child.kill('SIGTERM')
  bare.close()
  await Promise.all([pool.end(), owner.end(), closePools()])
}
