import { publishedCases } from '#fixtures/checks/published'

// `npm run check:published`: every published case against our functions, by source. Exits 1 where one disagrees.
interface Tally { cases: number, agreed: number, largest: number }
const bySource = new Map<string, Tally>()
const wrong: string[] = []
for (const { id, source, check } of publishedCases()) {
  const { off, largest } = check()
  const tally = bySource.get(source) ?? { cases: 0, agreed: 0, largest: 0 }
  tally.cases++
  if (off.length === 0) tally.agreed++
  else wrong.push(`${id}: ${off.join('; ')}`)
  tally.largest = Math.max(tally.largest, largest)
  bySource.set(source, tally)
}
console.log('cases  agreed  largest deviation, share of what is allowed  source')
for (const [source, { cases, agreed, largest }] of [...bySource].sort(([a], [b]) => (a < b ? -1 : 1))) {
  console.log(`${String(cases).padStart(5)}  ${String(agreed).padStart(6)}  ${largest.toPrecision(2).padStart(8)}  ${source}`)
}
const all = [...bySource.values()]
console.log(`${all.reduce((sum, tally) => sum + tally.cases, 0)} cases from ${bySource.size} sources, ${wrong.length} disagree`)
for (const line of wrong) console.error(line)
process.exit(wrong.length > 0 ? 1 : 0)
