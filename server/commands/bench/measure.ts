export interface BenchDatabase {
  ownerUrl: string
  applicationUrl: string
}

export const median = (values: number[]): number => {
  const sorted = [...values].sort((a, b) => a - b)
  return sorted.length % 2 === 1 ? sorted[(sorted.length - 1) / 2]! : (sorted[sorted.length / 2 - 1]! + sorted[sorted.length / 2]!) / 2
}

/** Runs every contestant once a round, in another order each round, since what comes first on a shared machine fares differently. */
export async function inRotation(rounds: number, contestants: Record<string, () => Promise<number>>): Promise<Record<string, number[]>> {
  const names = Object.keys(contestants)
  const results: Record<string, number[]> = Object.fromEntries(names.map(name => [name, []]))
  for (let round = 0; round < rounds; round++) {
    for (let i = 0; i < names.length; i++) {
      const name = names[(i + round) % names.length]!
      const value = await contestants[name]!()
      results[name]!.push(value)
      console.log(`  round ${round + 1}: ${name} ${value.toFixed(0)}/s`)
    }
  }
  return results
}

export function printRatios(title: string, results: Record<string, number[]>, yardstick: string): void {
  const base = results[yardstick]!
  console.log(`\n${title} (yardstick ${yardstick} = 1; medians of ${base.length} rounds)`)
  for (const [name, values] of Object.entries(results)) {
    const ratios = values.map((value, i) => value / base[i]!)
    console.log(`  ${name.padEnd(34)} ${median(ratios).toFixed(2)}   (${Math.min(...ratios).toFixed(2)}–${Math.max(...ratios).toFixed(2)})   ${median(values).toFixed(0)}/s`)
  }
}
