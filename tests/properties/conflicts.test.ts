import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { type Given, type Result, solve, toResult } from '@/lib/balance'
import { type Metered, meteredPlant } from './metered-plant'

/** True where the balances and the chosen meters have a solution, by plain elimination in exact small integers. */
function holds({ rows, nStreams, problem }: Metered, chosen: readonly Given[]): boolean {
  const table = [
    ...rows.map((row) => [...row, 0]),
    ...chosen.map(({ stream, value }) => [...problem.streams.map(({ id }) => Number(id === stream)), value]),
  ]
  let rank = 0
  for (let j = 0; j < nStreams; j++) {
    const at = table.findIndex((row, i) => i >= rank && Math.abs(row[j] as number) > 1e-9)
    if (at < 0) continue
    ;[table[rank], table[at]] = [table[at] as number[], table[rank] as number[]]
    const pivot = table[rank] as number[]
    table.forEach((row, i) => {
      if (i === rank) return
      const factor = (row[j] as number) / (pivot[j] as number)
      for (let k = 0; k <= nStreams; k++) row[k]! -= factor * (pivot[k] as number)
    })
    rank++
  }
  return table.slice(rank).every((row) => Math.abs(row[nStreams] as number) < 1e-9)
}

function minimalSetsByForce(plant: Metered): string[][] {
  const givens = plant.problem.givens ?? []
  const sets: Given[][] = []
  for (let mask = 1; mask < 1 << givens.length; mask++) {
    const chosen = givens.filter((_, bit) => mask & (1 << bit))
    if (holds(plant, chosen)) continue
    if (
      chosen.every((given) =>
        holds(
          plant,
          chosen.filter((other) => other !== given),
        ),
      )
    )
      sets.push(chosen)
  }
  return sets.map((set) => set.map(({ stream }) => stream).sort()).sort()
}

const listed = (result: Result): string[][] =>
  result.conflicts.map(({ givens }) => givens.map(({ stream }) => stream).sort()).sort()

describe('conflicts of small metered plants, against brute force', () => {
  it('lists exactly the minimal sets, marks exactly their members, and keeps what hangs on none of them', () => {
    fc.assert(
      fc.property(fc.nat(1e9), (seed) => {
        const plant = meteredPlant(seed)
        const result = toResult(plant.problem, solve(plant.problem))
        const sets = minimalSetsByForce(plant)
        expect(listed(result)).toEqual(sets)
        const atOdds = new Set(sets.flat())
        for (const { stream } of plant.problem.givens ?? []) {
          const cell = result.cells.find((its) => its.stream === stream && its.quantity === 'flow')
          expect(cell?.state).toBe(atOdds.has(stream) ? 'atOdds' : 'given')
        }
        const kept = (plant.problem.givens ?? []).filter(({ stream }) => !atOdds.has(stream))
        const alone = toResult(plant.problem, solve({ ...plant.problem, givens: kept }))
        for (const cell of result.cells) {
          if (cell.state === 'given' || cell.state === 'atOdds') continue
          const other = alone.cells.find(
            (its) => its.stream === cell.stream && its.quantity === cell.quantity && its.component === cell.component,
          )
          expect(cell.state).toBe(other?.state === 'unknown' ? 'unknown' : 'solvable')
          if (cell.state === 'solvable') expect(cell.value).toBeCloseTo(other?.value as number, 9)
        }
        for (const { givens } of result.conflicts)
          for (const { typed, implied, by } of givens) expect(typed - implied).toBeCloseTo(by, 9)
      }),
      { numRuns: 150, verbose: 1 },
    )
  })
})
