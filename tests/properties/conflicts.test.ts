import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { type Given, type Problem, type Result, solve, toResult } from '@/lib/balance'
import { generator } from './random-book'

/**
 * Small plants of total flows only (one component), with more meters than needed and some of them wrong. Every set of
 * meters is tried for whether it can hold, so the minimal sets are known by brute force.
 */
type Metered = { problem: Problem; rows: number[][]; nStreams: number }

function meteredPlant(seed: number): Metered {
  const random = generator(seed)
  const nUnits = 1 + Math.floor(random() * 3)
  const links: Problem['links'] = {}
  const rows: number[][] = []
  const sources: number[] = []
  const sinks: number[] = []
  for (let u = 0; u < nUnits; u++) {
    links[`U${u}`] = {}
    rows.push([])
  }
  const stream = (from: number, to: number): void => {
    sources.push(from)
    sinks.push(to)
    const id = `S${sources.length}`
    if (from >= 0) links[`U${from}`]![id] = 'out'
    if (to >= 0) links[`U${to}`]![id] = 'in'
  }
  stream(-1, 0)
  for (let u = 0; u < nUnits; u++) {
    stream(u, u + 1 < nUnits ? u + 1 : -1)
    if (random() < 0.6) stream(u, -1)
    if (random() < 0.4) stream(-1, u)
  }
  const nStreams = sources.length
  const balances = Array.from({ length: nUnits }, (_, u) =>
    sources.map((from, s) => (sinks[s] === u ? 1 : from === u ? -1 : 0)),
  )
  // Truth: outlets share what enters.
  const flow = new Array<number>(nStreams).fill(0)
  for (let u = 0; u < nUnits; u++) {
    sources.forEach((from, s) => {
      if (from === -1 && sinks[s] === u) flow[s] = 20 + Math.round(random() * 100)
    })
    const fed = flow.reduce((sum, n, s) => sum + (sinks[s] === u ? n : 0), 0)
    const outlets = sources.flatMap((from, s) => (from === u ? [s] : []))
    const [first, ...rest] = outlets as [number, ...number[]]
    flow[first] = fed
    for (const s of rest) {
      flow[s] = Math.round(fed * 0.3)
      flow[first]! -= flow[s] as number
    }
  }
  const givens: Given[] = []
  flow.forEach((n, s) => {
    if (random() < 0.75) givens.push({ stream: `S${s + 1}`, quantity: 'flow', value: random() < 0.2 ? n + 7 : n })
  })
  return {
    nStreams,
    rows: balances,
    problem: {
      format: 'tallybrook/1',
      name: 'meters',
      basis: 'mass',
      flowUnit: 'kg/h',
      components: [{ id: 'W' }],
      streams: flow.map((_, s) => ({ id: `S${s + 1}` })),
      units: Array.from({ length: nUnits }, (_, u) => ({ id: `U${u}`, kind: 'separator' as const })),
      links,
      givens,
    },
  }
}

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
