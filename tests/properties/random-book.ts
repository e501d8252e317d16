import type { Direction, Given, Problem, Rule, Unit } from '@/lib/balance/problem'

/** A random book with a hidden truth: flows that meet every balance, from which all givens and rules are taken. */
export type RandomBook = { problem: Problem; flow: number[][]; extent: number[] }
export type RandomBookOptions = {
  /** Part of all measures that is typed. */
  density: number
  /** Sharp separations: recoveries of 0 and 1, so that flows are exactly 0. */
  sharp?: boolean
  /** Powers of ten that feeds are spread over. */
  spread?: number
  splitters?: boolean
  reactors?: boolean
  rules?: boolean
  maxUnits?: number
  maxComponents?: number
}

/** A plain linear congruential generator, other than the solver's own. */
export function generator(seed: number): () => number {
  let state = BigInt(seed >>> 0) * 2862933555777941757n + 3037000493n
  const mask = (1n << 64n) - 1n
  return () => {
    state = (state * 6364136223846793005n + 1442695040888963407n) & mask
    return Number(state >> 11n) / 2 ** 53
  }
}

const isomers = ['A', 'B', 'C', 'D', 'E', 'F', 'G', 'H']

export function randomBook(seed: number, options: RandomBookOptions): RandomBook {
  // A closed loop that all is sent round has no truth: take the next one.
  for (let attempt = 0; ; attempt++) {
    const book = draw(seed + attempt * 1_000_003, options)
    if (book.flow.every((its) => its.every((n) => n >= 0 && n < 1e9))) return book
  }
}

function draw(seed: number, options: RandomBookOptions): RandomBook {
  const random = generator(seed)
  const below = (n: number): number => Math.floor(random() * n)
  const nComponents = 1 + below(options.maxComponents ?? 5)
  const nUnits = 1 + below(options.maxUnits ?? 5)
  const basis = random() < 0.7 ? 'mass' : 'mole'
  const components = isomers.slice(0, nComponents).map((id, k) => ({ id, molarMass: 20 + 13 * k }))
  const kinds = [
    'mixer',
    'separator',
    'separator',
    ...(options.splitters ? ['splitter'] : []),
    ...(options.reactors ? ['reactor'] : []),
  ]
  const units: Unit[] = Array.from({ length: nUnits }, (_, u) => ({
    id: `U${u}`,
    kind: kinds[below(kinds.length)] as Unit['kind'],
  }))

  // Streams: every unit gets outlets; each goes to another unit or leaves; units without inlet get a feed.
  const source: number[] = []
  const sink: number[] = []
  units.forEach((unit, u) => {
    const outlets = unit.kind === 'mixer' || unit.kind === 'reactor' ? 1 : 2 + below(2)
    for (let k = 0; k < outlets; k++) {
      source.push(u)
      const to = random() < 0.6 && k < outlets - 1 + Number(u < nUnits - 1) ? below(nUnits) : -1
      sink.push(to === u ? -1 : to)
    }
  })
  // Whatever has no way out is given one, so that the plant drains.
  const leaves = (u: number, seen = new Set<number>()): boolean =>
    source.some(
      (from, s) =>
        from === u &&
        (sink[s] === -1 || (!seen.has(sink[s] as number) && leaves(sink[s] as number, new Set([...seen, u])))),
    )
  for (let u = 0; u < nUnits; u++) if (!leaves(u)) sink[source.indexOf(u)] = -1

  // Every unit that nothing reaches from outside is fed.
  const reached = (u: number, seen: number[] = []): boolean =>
    sink.some(
      (to, s) =>
        to === u &&
        (source[s] === -1 || (!seen.includes(source[s] as number) && reached(source[s] as number, [...seen, u]))),
    )
  for (let u = 0; u < nUnits; u++)
    for (let k = 0; k < (!reached(u) || random() < 0.3 ? 1 + below(2) : 0); k++) {
      source.push(-1)
      sink.push(u)
    }
  const nStreams = source.length

  const reactions = units.flatMap((unit, u) =>
    unit.kind === 'reactor' && nComponents > 1
      ? [{ id: `R${u}`, unit: unit.id, u, from: below(nComponents), conversion: 0.2 + 0.6 * random() }]
      : [],
  )
  const toOf = reactions.map(({ from }) => (from + 1) % nComponents)
  // n = transfer n + feed, component by component coupled only through reactions: solved densely over (stream, component).
  const size = nStreams * nComponents
  const matrix = Array.from({ length: size }, () => new Array<number>(size).fill(0))
  const rhs = new Array<number>(size).fill(0)
  const split = new Map<number, number[]>()
  for (let u = 0; u < nUnits; u++) {
    const outlets = source.flatMap((from, s) => (from === u ? [s] : []))
    const shares = normalised(outlets.map(() => 0.1 + random()))
    const inlets = sink.flatMap((to, s) => (to === u ? [s] : []))
    for (let c = 0; c < nComponents; c++) {
      const own =
        units[u]?.kind === 'splitter'
          ? shares
          : sharpened(normalised(outlets.map(() => 0.02 + random())), options.sharp === true && random() < 0.3, below)
      outlets.forEach((s, k) => {
        split.set(s * nComponents + c, own)
        for (const from of inlets)
          for (let d = 0; d < nComponents; d++) {
            const r = reactions.findIndex((reaction) => reaction.u === u)
            const reaction = reactions[r]
            let part = c === d ? 1 : 0
            if (reaction && d === reaction.from) {
              if (c === d) part -= reaction.conversion
              if (c === toOf[r]) part += (reaction.conversion * (basis === 'mass' ? 1 : 1)) as number
            }
            matrix[s * nComponents + c]![from * nComponents + d]! += (own[k] as number) * part
          }
      })
    }
  }
  for (let s = 0; s < nStreams; s++)
    if (source[s] === -1)
      for (let c = 0; c < nComponents; c++)
        rhs[s * nComponents + c] =
          random() < (options.sharp ? 0.25 : 0)
            ? 0
            : (0.1 + random()) * 10 ** (2 + (options.spread ?? 0) * (random() - 0.5))
  const flat = solveSquare(matrix, rhs)
  const flow = Array.from({ length: nStreams }, (_, s) => flat.slice(s * nComponents, (s + 1) * nComponents))
  const fedOf = (u: number, c: number): number =>
    flow.reduce((sum, its, s) => sum + (sink[s] === u ? (its[c] as number) : 0), 0)
  // Equal masses change place on a mass basis, so stoichiometry is 1/M there; isomers on a mole basis.
  const extent = reactions.map(({ u, from, conversion }) => conversion * fedOf(u, from))

  const streams = flow.map((its, s) => ({
    id: `${s + 1}`,
    components: components.filter((_, c) => (its[c] as number) > 0 || random() < 0.5).map(({ id }) => id),
  }))
  streams.forEach((stream) => {
    if (stream.components.length === 0) stream.components.push('A')
  })
  // A component absent from one outlet of a splitter is absent from all.
  units.forEach((unit, u) => {
    if (unit.kind !== 'splitter') return
    const outlets = streams.filter((_, s) => source[s] === u)
    const all = new Set(outlets.flatMap((stream) => stream.components))
    for (const stream of outlets) stream.components = components.filter(({ id }) => all.has(id)).map(({ id }) => id)
  })
  const problem: Problem = {
    format: 'tallybrook/1',
    name: `random ${seed}`,
    basis,
    flowUnit: basis === 'mass' ? 'kg/h' : 'kmol/h',
    // One molar mass for all where there are reactions, so that one for one balances on both bases.
    components: reactions.length > 0 ? components.map(({ id }) => ({ id, molarMass: 50 })) : components,
    streams,
    units,
    links: Object.fromEntries(
      units.map((unit, u) => [
        unit.id,
        Object.fromEntries(
          streams.flatMap(({ id }, s): [string, Direction][] =>
            source[s] === u ? [[id, 'out']] : sink[s] === u ? [[id, 'in']] : [],
          ),
        ),
      ]),
    ),
    reactions: reactions.map(({ id, unit, from }, r) => ({
      id,
      unit,
      stoichiometry: { [isomers[from] as string]: -1, [isomers[toOf[r] as number] as string]: 1 },
    })),
    givens: [],
    relations: [],
  }
  for (const [r, value] of extent.entries()) extent[r] = basis === 'mass' ? value / 50 : value
  typeSome(problem, flow, extent, options, random, { source, sink })
  return { problem, flow, extent }
}

const normalised = (list: number[]): number[] => {
  const sum = list.reduce((total, value) => total + value, 0)
  return list.map((value) => value / sum)
}

function sharpened(list: number[], sharp: boolean, below: (n: number) => number): number[] {
  if (!sharp || list.length < 2) return list
  const all = below(list.length)
  return list.map((_, k) => Number(k === all))
}

function typeSome(
  problem: Problem,
  flow: number[][],
  extent: number[],
  { density, rules }: RandomBookOptions,
  random: () => number,
  { source, sink }: { source: number[]; sink: number[] },
): void {
  const givens = problem.givens as Given[]
  const relations = problem.relations as Rule[]
  const sum = (its: number[]): number => its.reduce((total, value) => total + value, 0)
  const mass = problem.components.map(({ molarMass }) => molarMass as number)
  const other = (n: number, c: number): number =>
    problem.basis === 'mass' ? n / (mass[c] as number) : n * (mass[c] as number)
  problem.streams.forEach((stream, s) => {
    const its = flow[s] as number[]
    const F = sum(its)
    const otherF = its.reduce((total, n, c) => total + other(n, c), 0)
    if (random() < density) givens.push({ stream: stream.id, quantity: 'flow', value: F })
    if (random() < density * 0.1)
      givens.push({ stream: stream.id, quantity: problem.basis === 'mass' ? 'moleFlow' : 'massFlow', value: otherF })
    problem.components.forEach(({ id: component }, c) => {
      if (!stream.components?.includes(component)) return
      const n = its[c] as number
      if (random() < density * 0.2) givens.push({ stream: stream.id, quantity: 'componentFlow', component, value: n })
      if (F <= 0) return
      if (random() < density)
        givens.push({
          stream: stream.id,
          quantity: problem.basis === 'mass' ? 'massFraction' : 'moleFraction',
          component,
          value: n / F,
        })
      if (random() < density * 0.15)
        givens.push({
          stream: stream.id,
          quantity: problem.basis === 'mass' ? 'moleFraction' : 'massFraction',
          component,
          value: other(n, c) / otherF,
        })
    })
  })
  if (!rules) return
  let next = 0
  const rule = (body: object): void => {
    relations.push({ id: `Q${next++}`, ...body } as Rule)
  }
  problem.units.forEach((unit, u) => {
    const inlets = sink.flatMap((to, s) => (to === u ? [s] : []))
    const outlets = source.flatMap((from, s) => (from === u ? [s] : []))
    const fed = (c: number): number => inlets.reduce((total, s) => total + ((flow[s] as number[])[c] as number), 0)
    for (const s of outlets) {
      const all = sum(inlets.map((i) => sum(flow[i] as number[])))
      if (unit.kind === 'splitter' && all > 0 && random() < density)
        rule({ kind: 'split', unit: unit.id, stream: `${s + 1}`, value: sum(flow[s] as number[]) / all })
      problem.components.forEach(({ id: component }, c) => {
        if (problem.streams[s]?.components?.includes(component) && fed(c) > 0 && random() < density * 0.3)
          rule({
            kind: 'recovery',
            unit: unit.id,
            component,
            stream: `${s + 1}`,
            value: ((flow[s] as number[])[c] as number) / fed(c),
          })
      })
      const other_ = outlets[0] as number
      const base = sum(flow[other_] as number[])
      if (s !== other_ && base > 0 && random() < density * 0.3)
        rule({ kind: 'flowRatio', stream: `${s + 1}`, of: `${other_ + 1}`, value: sum(flow[s] as number[]) / base })
    }
  })
  problem.reactions?.forEach(({ id, unit, stoichiometry }, r) => {
    const u = Number(unit.slice(1))
    const [component] = Object.entries(stoichiometry).find(([, nu]) => nu < 0) as [string, number]
    const c = problem.components.findIndex((its) => its.id === component)
    const fed = sink.reduce((total, to, s) => total + (to === u ? ((flow[s] as number[])[c] as number) : 0), 0)
    const formed = extent[r] as number
    if (random() < density) rule({ kind: 'extent', reaction: id, value: formed })
    if (fed > 0 && random() < density)
      rule({ kind: 'conversion', unit, component, value: (formed * (problem.basis === 'mass' ? 50 : 1)) / fed })
  })
}

/** Plain dense elimination with partial pivoting of (I - matrix) x = rhs. */
function solveSquare(matrix: number[][], rhs: number[]): number[] {
  const n = rhs.length
  const rows = matrix.map((row, i) => [...row.map((value, j) => (i === j ? 1 : 0) - value), rhs[i] as number])
  for (let k = 0; k < n; k++) {
    let best = k
    for (let i = k + 1; i < n; i++) if (Math.abs(rows[i]![k]!) > Math.abs(rows[best]![k]!)) best = i
    ;[rows[k], rows[best]] = [rows[best] as number[], rows[k] as number[]]
    for (let i = 0; i < n; i++) {
      if (i === k || rows[i]![k] === 0) continue
      const factor = rows[i]![k]! / rows[k]![k]!
      for (let j = k; j <= n; j++) rows[i]![j]! -= factor * rows[k]![j]!
    }
  }
  return rows.map((row, k) => {
    const value = (row[n] as number) / (row[k] as number)
    return Math.abs(value) < 1e-9 ? 0 : value
  })
}
