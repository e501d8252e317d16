import type { Direction, Given, Problem, Rule, Unit } from '@/lib/balance/problem'
import { generator } from './random-book'
import { over, PRIME, residue, solveModulo, times } from './residues'

/**
 * A random book whose flows span six decades and more: feeds log-uniform, splits down to 1e-6, sharp separations,
 * recycles that return 99 %, redundant givens in any order. Beside the truth in numbers stands the same plant with
 * random residues in place of all numbers, so that what follows from what can be judged without any tolerance.
 */
export type WideBook = {
  problem: Problem
  flow: number[][]
  extent: number[]
  flowResidue: number[][]
  extentResidue: number[]
}
export type WideBookOptions = {
  density: number
  /** Significant digits to which values are typed. */
  digits: number
  /** Half a unit in the last digit goes with each value. */
  halfWidths?: boolean
}

export const wideComponents = ['A', 'B', 'C', 'D', 'E']
type Plant = { units: Unit[]; source: number[]; sink: number[]; nComponents: number }

export function wideBook(seed: number, options: WideBookOptions): WideBook {
  for (let attempt = 0; ; attempt++) {
    const book = draw(seed + attempt * 1_000_003, options)
    const all = book.flow.flat()
    if (all.some((n) => n > 0) && all.every((n) => n < 1e8)) return book
  }
}

function draw(seed: number, options: WideBookOptions): WideBook {
  const random = generator(seed)
  const below = (n: number): number => Math.floor(random() * n)
  const plant = drawPlant(random, below)
  const { units, source, sink, nComponents } = plant
  const basis = random() < 0.7 ? 'mass' : 'mole'
  const nStreams = source.length
  const reactions = units.flatMap((unit, u) =>
    unit.kind === 'reactor' && nComponents > 1 ? [{ id: `R${u}`, u, from: below(nComponents) }] : [],
  )
  const conversion = reactions.map(() => (random() < 0.3 ? 1 - 10 ** (-4 * random()) : 0.2 + 0.6 * random()))
  const conversionResidue = reactions.map(() => 1 + below(PRIME - 1))
  const at = (s: number, c: number): number => s * nComponents + c
  const size = nStreams * nComponents
  const square = (): number[][] => Array.from({ length: size }, () => new Array<number>(size).fill(0))
  const transfer = square()
  const transferResidue = square()
  const feed = new Array<number>(size).fill(0)
  const feedResidue = new Array<number>(size).fill(0)
  for (let u = 0; u < units.length; u++) {
    const outlets = source.flatMap((from, s) => (from === u ? [s] : []))
    const inlets = sink.flatMap((to, s) => (to === u ? [s] : []))
    const r = reactions.findIndex((reaction) => reaction.u === u)
    // An outlet of a splitter without any flow has no composition to speak of: what it says is a matter of branches.
    const mayBeSharp = units[u]?.kind !== 'splitter'
    let shares = drawShares(outlets, sink, random, below, mayBeSharp)
    for (let c = 0; c < nComponents; c++) {
      if (c > 0 && mayBeSharp) shares = drawShares(outlets, sink, random, below, mayBeSharp)
      outlets.forEach((s, k) => {
        for (const from of inlets)
          for (let d = 0; d < nComponents; d++) {
            const reacts = reactions[r]?.from === d
            const part = Number(c === d) - (reacts && c === d ? (conversion[r] as number) : 0)
            const gained = reacts && c === (d + 1) % nComponents ? (conversion[r] as number) : 0
            transfer[at(s, c)]![at(from, d)]! += (shares.real[k] as number) * (part + gained)
            const x = reacts ? (conversionResidue[r] as number) : 0
            const partResidue = (c === d ? 1 - x : 0) + (reacts && c === (d + 1) % nComponents ? x : 0)
            transferResidue[at(s, c)]![at(from, d)] = times(shares.residue[k] as number, residue(partResidue))
          }
      })
    }
  }
  const decades = 4 + 3 * random()
  for (let s = 0; s < nStreams; s++)
    for (let c = 0; c < nComponents; c++)
      if (source[s] === -1 && random() < 0.8) {
        feed[at(s, c)] = 10 ** (3 + decades * (random() - 0.6))
        feedResidue[at(s, c)] = 1 + below(PRIME - 1)
      }
  const flat = steady(transfer, feed)
  const flatResidue = solveModulo(transferResidue, feedResidue)
  const byStream = (list: number[]): number[][] =>
    Array.from({ length: nStreams }, (_, s) => list.slice(s * nComponents, (s + 1) * nComponents))
  const flow = byStream(flat)
  const flowResidue = byStream(flatResidue)
  const fed = (list: number[][], u: number, c: number): number =>
    list.reduce((sum, its, s) => sum + (sink[s] === u ? (its[c] as number) : 0), 0)
  const molar = basis === 'mass' ? 50 : 1
  const extent = reactions.map(({ u, from }, r) => ((conversion[r] as number) * fed(flow, u, from)) / molar)
  const extentResidue = reactions.map(({ u, from }, r) =>
    over(times(conversionResidue[r] as number, residue(fed(flowResidue, u, from))), molar),
  )
  const ids = wideComponents.slice(0, nComponents)
  const streams = flow.map((its, s) => ({
    id: `${s + 1}`,
    components: ids.filter((_, c) => (its[c] as number) > 0 || random() < 0.5),
  }))
  for (const stream of streams) if (stream.components.length === 0) stream.components.push('A')
  units.forEach((unit, u) => {
    if (unit.kind !== 'splitter') return
    const outlets = streams.filter((_, s) => source[s] === u)
    const all = new Set(outlets.flatMap((stream) => stream.components))
    for (const stream of outlets) stream.components = ids.filter((id) => all.has(id))
  })
  const problem: Problem = {
    format: 'tallybrook/1',
    name: `wide ${seed}`,
    basis,
    flowUnit: basis === 'mass' ? 'kg/h' : 'kmol/h',
    components: ids.map((id, k) => ({ id, molarMass: reactions.length > 0 ? 50 : 20 + 13 * k })),
    streams,
    units,
    links: Object.fromEntries(
      units.map(({ id }, u) => [
        id,
        Object.fromEntries(
          streams.flatMap((stream, s): [string, Direction][] =>
            source[s] === u ? [[stream.id, 'out']] : sink[s] === u ? [[stream.id, 'in']] : [],
          ),
        ),
      ]),
    ),
    reactions: reactions.map(({ id, u, from }) => ({
      id,
      unit: `U${u}`,
      stoichiometry: { [ids[from] as string]: -1, [ids[(from + 1) % nComponents] as string]: 1 },
    })),
    givens: [],
    relations: [],
  }
  typeSome(problem, flow, extent, plant, options, random)
  return { problem, flow, extent, flowResidue, extentResidue }
}

/** A chain of units with branches forward, out and back; the first outlet of each leads on, so that everything drains. */
function drawPlant(random: () => number, below: (n: number) => number): Plant {
  const nComponents = 1 + below(5)
  const kinds = ['mixer', 'separator', 'separator', 'separator', 'splitter', 'reactor'] as const
  const units = Array.from(
    { length: 1 + below(6) },
    (_, u): Unit => ({ id: `U${u}`, kind: kinds[below(kinds.length)] ?? 'mixer' }),
  )
  const source: number[] = []
  const sink: number[] = []
  const stream = (from: number, to: number): void => {
    source.push(from)
    sink.push(to)
  }
  units.forEach((unit, u) => {
    if (u === 0 || random() < 0.25) for (let k = 0; k < 1 + below(2); k++) stream(-1, u)
    stream(u, u + 1 < units.length ? u + 1 : -1)
    if (unit.kind === 'mixer' || unit.kind === 'reactor') return
    for (let k = 0; k < 1 + below(2); k++) {
      const where = random()
      stream(u, where < 0.4 && u > 0 ? below(u) : where < 0.6 && u + 1 < units.length ? u + 1 : -1)
    }
  })
  return { units, source, sink, nComponents }
}

/** Shares of the outlets of a unit: even, down to 1e-6, all to one outlet, or 99 % of it sent back. */
function drawShares(
  outlets: number[],
  sink: number[],
  random: () => number,
  below: (n: number) => number,
  sharp: boolean,
): { real: number[]; residue: number[] } {
  const style = random()
  let weights = outlets.map(() => (style < 0.4 ? 0.05 + random() : style < 0.7 ? 10 ** (-6 * random()) : 1))
  const back = outlets.findIndex((s) => (sink[s] as number) >= 0 && s !== outlets[0] && random() < 0.5)
  if (sharp && style > 0.8 && outlets.length > 1) weights = outlets.map((_, k) => Number(k === 0))
  else if (style > 0.7 && back > 0) weights = outlets.map((_, k) => (k === back ? 0.99 : 0.01 / (outlets.length - 1)))
  const sum = weights.reduce((total, value) => total + value, 0)
  const residues = weights.map((weight) => (weight === 0 ? 0 : 1 + below(PRIME - 1)))
  const residueSum = residue(residues.reduce((total, value) => total + value, 0))
  return { real: weights.map((weight) => weight / sum), residue: residues.map((value) => over(value, residueSum)) }
}

/** n = transfer n + feed: by elimination, then by substitution, where nothing cancels, until every row closes to rounding. */
function steady(transfer: number[][], feed: number[]): number[] {
  const n = feed.length
  const rows = transfer.map((row, i) => [...row.map((value, j) => Number(i === j) - value), feed[i] as number])
  for (let k = 0; k < n; k++)
    for (let i = 0; i < n; i++) {
      if (i === k || rows[i]![k] === 0) continue
      const factor = rows[i]![k]! / rows[k]![k]!
      for (let j = k; j <= n; j++) rows[i]![j]! -= factor * rows[k]![j]!
    }
  const x = rows.map((row, k) => Math.max(0, (row[n] as number) / (row[k] as number)))
  const entries = transfer.map((row) => row.flatMap((value, j) => (value !== 0 ? [j] : [])))
  // What nothing reaches is exactly 0.
  const reached = feed.map((value) => value > 0)
  for (let sweep = 0; sweep < n; sweep++)
    entries.forEach((its, i) => {
      if (its.some((j) => reached[j])) reached[i] = true
    })
  for (let i = 0; i < n; i++) if (!reached[i]) x[i] = 0
  for (let sweep = 0; sweep < 400; sweep++)
    for (let i = 0; i < n; i++)
      x[i] = (entries[i] as number[]).reduce((sum, j) => sum + transfer[i]![j]! * (x[j] as number), feed[i] as number)
  return x
}

function typeSome(
  problem: Problem,
  flow: number[][],
  extent: number[],
  { source, sink }: Plant,
  { density, digits, halfWidths }: WideBookOptions,
  random: () => number,
): void {
  const typed = (value: number): { value: number; halfWidth?: number } => {
    if (digits >= 17 || value === 0) return { value }
    const rounded = Number(value.toPrecision(digits))
    return halfWidths
      ? { value: rounded, halfWidth: 0.5 * 10 ** (Math.floor(Math.log10(Math.abs(value))) - digits + 1) }
      : { value: rounded }
  }
  const givens: Given[] = []
  const relations: Rule[] = []
  const sum = (its: number[]): number => its.reduce((total, value) => total + value, 0)
  const own = problem.basis
  const other = own === 'mass' ? 'mole' : 'mass'
  const molar = (n: number, c: number): number => {
    const mass = problem.components[c]?.molarMass as number
    return own === 'mass' ? n / mass : n * mass
  }
  const fraction = (stream: string, quantity: Given['quantity'], component: string, value: number): void => {
    const inParts = value > 0 && value < 1e-3 && random() < 0.6
    givens.push({
      stream,
      quantity,
      component,
      ...(inParts && { unit: 'ppm' }),
      ...typed(inParts ? value * 1e6 : value),
    })
  }
  problem.streams.forEach(({ id: stream, components }, s) => {
    const its = flow[s] as number[]
    const F = sum(its)
    const others = sum(its.map(molar))
    if (random() < density) givens.push({ stream, quantity: 'flow', ...typed(F) })
    if (random() < density * 0.15) givens.push({ stream, quantity: `${other}Flow`, ...typed(others) })
    problem.components.forEach(({ id: component }, c) => {
      if (!components?.includes(component)) return
      const n = its[c] as number
      if (random() < density * 0.4) givens.push({ stream, quantity: 'componentFlow', component, ...typed(n) })
      if (F <= 0) return
      if (random() < density) fraction(stream, `${own}Fraction`, component, n / F)
      if (random() < density * 0.2) fraction(stream, `${other}Fraction`, component, molar(n, c) / others)
    })
  })
  const rule = (body: object): void => {
    relations.push({ id: `Q${relations.length}`, ...body } as Rule)
  }
  problem.units.forEach((unit, u) => {
    const inlets = sink.flatMap((to, s) => (to === u ? [s] : []))
    const outlets = source.flatMap((from, s) => (from === u ? [s] : []))
    const all = sum(inlets.flatMap((s) => flow[s] as number[]))
    for (const s of outlets) {
      const stream = `${s + 1}`
      if (unit.kind === 'splitter' && all > 0 && random() < density)
        rule({ kind: 'split', unit: unit.id, stream, ...typed(sum(flow[s] as number[]) / all) })
      problem.components.forEach(({ id: component }, c) => {
        const fed = sum(inlets.map((i) => flow[i]?.[c] as number))
        if (problem.streams[s]?.components?.includes(component) && fed > 0 && random() < density * 0.4)
          rule({ kind: 'recovery', unit: unit.id, component, stream, ...typed((flow[s]?.[c] as number) / fed) })
      })
      const first = outlets[0] as number
      if (s !== first && sum(flow[first] as number[]) > 0 && random() < density * 0.3)
        rule({
          kind: 'flowRatio',
          stream,
          of: `${first + 1}`,
          ...typed(sum(flow[s] as number[]) / sum(flow[first] as number[])),
        })
    }
  })
  problem.reactions?.forEach(({ id }, r) => {
    if (random() < density * 0.6) rule({ kind: 'extent', reaction: id, ...typed(extent[r] as number) })
  })
  problem.givens = givens
    .map((given) => ({ given, at: random() }))
    .sort((a, b) => a.at - b.at)
    .map(({ given }) => given)
  problem.relations = relations
}
