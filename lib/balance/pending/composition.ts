import { combine, constantForm, type LinearForm, part, total } from '../measure/measure'
import type { Model } from '../model'
import { MOVES } from '../sparse/solve'
import { addProbe, evaluate, fixedValue, type Knowledge, knownMeasure } from '../states/knowledge'
import type { TurnedRow } from './pending'

/** Streams of one composition: the outlets of a splitter, or what a rule names. */
export type Composition = {
  streams: number[]
  /** Components that can be in all of them; the others are 0 by rows of their own. */
  components: number[]
  /** Sets of streams whose sum has the same composition. */
  pools: number[][]
}

/** A flow of a pool that cancels to less than this part of its terms is too blurred to draw relations from. */
const BLURRED = 1e-5

/** Above this many streams only single ones and all together are looked at as pools. */
const SUBSETS_UP_TO = 4

/** `mixed`: streams that together make up all of `streams`, such as the inlets of a splitter. */
export function compositionOf(model: Model, streams: number[], mixed: number[] = []): Composition {
  const lists = streams.map((s) => new Set(model.present[s]))
  const components = (model.present[streams[0] as number] as number[]).filter((c) => lists.every((list) => list.has(c)))
  const pools = streams.map((s) => [s])
  if (streams.length <= SUBSETS_UP_TO) {
    for (let mask = 1; mask < 1 << streams.length; mask++) {
      const pool = streams.filter((_, bit) => mask & (1 << bit))
      if (pool.length > 1) pools.push(pool)
    }
  } else pools.push([...streams])
  if (mixed.length > 0) pools.push(mixed)
  return { streams, components, pools }
}

const poolPart = (model: Model, pool: number[], component: number): LinearForm =>
  pool.reduce((form, s) => combine(1, form, 1, part(model, s, component)), constantForm(0))
const poolTotal = (model: Model, pool: number[]): LinearForm =>
  pool.reduce((form, s) => combine(1, form, 1, total(model, s)), constantForm(0))

/**
 * Rows that follow for streams of one composition from what is known: a linear relation between the components of one
 * pool (all that hold in every solution, found from samples) holds in each stream; a known ratio of two flows holds for
 * every component. `settled` is true where nothing more can follow.
 */
export function turnComposition(
  model: Model,
  knowledge: Knowledge,
  composition: Composition,
): { rows: TurnedRow[]; settled: boolean } {
  if (isMet(model, knowledge, composition)) return { rows: [], settled: true }
  const rows: TurnedRow[] = []
  const { streams, components, pools } = composition
  for (const pool of pools)
    for (const relation of relationsOf(model, knowledge, pool, components)) {
      const over = (its: number[]): LinearForm =>
        relation.reduce(
          (form, factor, k) =>
            factor === 0 ? form : combine(1, form, factor, poolPart(model, its, components[k] as number)),
          constantForm(0),
        )
      const restsOn = [over(pool)]
      for (const s of streams) if (!(pool.length === 1 && pool[0] === s)) rows.push({ form: over([s]), restsOn })
    }
  // A component that is 0 in one of the streams is 0 in all: how its flows compare says nothing of the totals.
  const telling = components.filter((c) => pools.every((pool) => fixedValue(knowledge, poolPart(model, pool, c)) !== 0))
  for (const [a, b] of pairs(pools)) {
    const ratio = ratioOf(model, knowledge, a, b, telling)
    if (!ratio) continue
    for (const c of components)
      rows.push({ form: combine(1, poolPart(model, a, c), -ratio.value, poolPart(model, b, c)), restsOn: [ratio.form] })
  }
  return { rows: rows.filter(({ form }) => moves(knowledge, form)), settled: false }
}

/** True where the form is not already 0 in every solution. */
function moves(knowledge: Knowledge, form: LinearForm): boolean {
  const isNothing = (x: Float64Array, direction: boolean): boolean => {
    const { value, terms } = evaluate(form, x, direction)
    return Math.abs(value) <= MOVES * terms
  }
  return !(isNothing(knowledge.particular, false) && knowledge.probes.every((h) => isNothing(h, true)))
}

/** True where the streams have one composition in every solution already, or at most one of them flows. */
function isMet(model: Model, knowledge: Knowledge, { streams, components }: Composition): boolean {
  const { generic, probes } = knowledge
  const points = [generic]
  const [, second, third] = probes
  if (second) points.push(generic.map((value, j) => value + (second[j] as number)))
  if (second && third)
    points.push(generic.map((value, j) => value - 0.7 * (second[j] as number) + 1.3 * (third[j] as number)))
  return points.every((x) => {
    const flows = streams.map((s) =>
      components.map((c) => x[model.flowColumn[s * model.nComponents + c] as number] as number),
    )
    const totals = flows.map((its) => its.reduce((sum, n) => sum + n, 0))
    const sizes = flows.map((its) => its.reduce((sum, n) => sum + Math.abs(n), 0))
    return flows.every((left, a) =>
      flows.every((right, b) =>
        left.every((n, k) => {
          const gap = n * (totals[b] as number) - (right[k] as number) * (totals[a] as number)
          const terms = Math.abs(n) * (sizes[b] as number) + Math.abs(right[k] as number) * (sizes[a] as number)
          return a >= b || Math.abs(gap) <= MOVES * terms
        }),
      ),
    )
  })
}

function pairs(pools: number[][]): [number[], number[]][] {
  const list: [number[], number[]][] = []
  pools.forEach((a, i) => {
    for (const b of pools.slice(i + 1)) if (!a.every((s) => b.includes(s)) || a.length !== b.length) list.push([a, b])
  })
  return list
}

/** Flows are not negative and a part is not more than the whole; a ratio that breaks this is one of flows that are 0. */
function isPossible(ratio: number, a: number[], b: number[]): boolean {
  const within = (left: number[], right: number[]): boolean => left.every((s) => right.includes(s))
  return ratio >= 0 && (ratio <= 1 || !within(a, b)) && (ratio >= 1 || !within(b, a))
}

/** The ratio of two pools where the totals or one component give it in every solution. */
function ratioOf(
  model: Model,
  knowledge: Knowledge,
  a: number[],
  b: number[],
  telling: number[],
): { value: number; form: LinearForm } | undefined {
  const forms: [LinearForm, LinearForm][] = [
    [poolTotal(model, a), poolTotal(model, b)],
    ...telling.map((c): [LinearForm, LinearForm] => [poolPart(model, a, c), poolPart(model, b, c)]),
  ]
  for (const [numerator, denominator] of forms) {
    const value = knownMeasure(knowledge, { numerator, denominator })
    if (value !== undefined && isPossible(value, a, b))
      return { value, form: combine(1, numerator, -value, denominator) }
  }
  return undefined
}

/**
 * A basis of the linear relations between a pool's component flows that hold in every solution: the annihilator of
 * samples, by elimination with complete pivoting. Samples are added until one more brings nothing new.
 */
function relationsOf(model: Model, knowledge: Knowledge, pool: number[], components: number[]): number[][] {
  const forms = components.map((c) => poolPart(model, pool, c))
  const sample = (x: Float64Array, direction: boolean): number[] =>
    forms.map((form) => {
      const { value, terms } = evaluate(form, x, direction)
      if (Math.abs(value) <= MOVES * terms) return 0
      if (Math.abs(value) < BLURRED * terms) blurred = true
      return value
    })
  let blurred = false
  const basis: { pivot: number; row: number[] }[] = []
  insert(basis, sample(knowledge.particular, false))
  // The directions come after the one solution: the first that brings nothing new ends it.
  for (let q = 0; knowledge.probes.length > 0 && basis.length < components.length; q++) {
    const before = basis.length
    insert(basis, sample(knowledge.probes[q] ?? addProbe(knowledge), true))
    if (basis.length === before) break
  }
  if (blurred || basis.length === 0 || basis.length === components.length) return []
  const pivots = new Set(basis.map(({ pivot }) => pivot))
  const relations: number[][] = []
  components.forEach((_, k) => {
    if (pivots.has(k)) return
    const relation = components.map(() => 0)
    relation[k] = 1
    for (const { pivot, row } of basis) relation[pivot] = -(row[k] as number)
    relations.push(relation)
  })
  return relations
}

/** Takes one sample into a reduced row-echelon basis, where it is not nothing beside its terms. */
function insert(basis: { pivot: number; row: number[] }[], sample: number[]): void {
  const row = [...sample]
  const terms = row.map(Math.abs)
  for (const { pivot, row: other } of basis) {
    const factor = row[pivot] as number
    other.forEach((value, k) => {
      row[k]! -= factor * value
      terms[k]! += Math.abs(factor * value)
    })
  }
  let pivot = -1
  row.forEach((value, k) => {
    if (Math.abs(value) <= 10 * MOVES * (terms[k] as number)) row[k] = 0
    else if (pivot < 0 || Math.abs(value) > Math.abs(row[pivot] as number)) pivot = k
  })
  if (pivot < 0) return
  const head = row[pivot] as number
  const reduced = row.map((value) => value / head)
  for (const entry of basis) {
    const factor = entry.row[pivot] as number
    entry.row = entry.row.map((value, k) => {
      const off = factor * (reduced[k] as number)
      return Math.abs(value - off) <= MOVES * (Math.abs(value) + Math.abs(off)) ? 0 : value - off
    })
  }
  basis.push({ pivot, row: reduced })
}
