import type { Given, Problem } from '@/lib/balance'
import { generator } from './random-book'

/**
 * Small plants of total flows only (one component), with more meters than needed and some of them wrong. Every set of
 * meters is tried for whether it can hold, so the minimal sets are known by brute force.
 */
export type Metered = { problem: Problem; rows: number[][]; nStreams: number }

export function meteredPlant(
  seed: number,
  meter: (flow: number, random: () => number) => Partial<Given> = plain,
): Metered {
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
    if (random() < 0.75) givens.push({ stream: `S${s + 1}`, quantity: 'flow', value: n, ...meter(n, random) })
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

const plain = (flow: number, random: () => number): Partial<Given> => ({ value: random() < 0.2 ? flow + 7 : flow })
