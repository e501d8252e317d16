import { combine, constantForm, type LinearForm } from '../measure/measure'
import type { Model } from '../model'
import { MOVES, type Vector } from '../sparse/solve'
import { evaluate, fixedValue, type Knowledge, knownMeasure, moved } from '../states/knowledge'
import { poolPart, poolTotal } from './pool'
import { type Echelon, insert, relationsOf } from './relations'
import type { TurnedRow } from './turned-row'

/** Streams of one composition: the outlets of a splitter, or what a rule names. */
export type Composition = {
  streams: number[]
  /** Components that can be in all of them; the others are 0 by rows of their own. */
  components: number[]
  /** Sets of streams whose sum has the same composition. */
  pools: number[][]
  /** Streams that together make up all of `streams`; one of the pools where there are some. */
  mixed: number[]
}

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
  return { streams, components, pools, mixed }
}

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
  const rows = [...relationRows(model, knowledge, composition), ...ratioRows(model, knowledge, composition)]
  return { rows: rows.filter(({ form }) => moves(knowledge, form)), settled: false }
}

/** Relations between components that hold in a pool, for every other stream; none that follows from those before it. */
function relationRows(model: Model, knowledge: Knowledge, { streams, components, pools }: Composition): TurnedRow[] {
  const rows: TurnedRow[] = []
  const had = new Map(streams.map((s): [number, Echelon] => [s, []]))
  for (const pool of pools)
    for (const relation of relationsOf(model, knowledge, pool, components)) {
      const over = (its: number[]): LinearForm =>
        relation.reduce(
          (form, factor, k) =>
            factor === 0 ? form : combine(1, form, factor, poolPart(model, its, components[k] as number)),
          constantForm(0),
        )
      for (const s of streams) {
        if (pool.length === 1 && pool[0] === s) continue
        if (insert(had.get(s) as Echelon, relation)) rows.push({ form: over([s]), restsOn: [over(pool)] })
      }
    }
  return rows
}

/** The same ratio of two pools for every component, where one is known; no two ways to the same ratio. */
function ratioRows(model: Model, knowledge: Knowledge, { components, pools, mixed }: Composition): TurnedRow[] {
  const rows: TurnedRow[] = []
  // A component that is 0 in one of the streams is 0 in all: how its flows compare says nothing of the totals.
  const telling = components.filter((c) => pools.every((pool) => fixedValue(knowledge, poolPart(model, pool, c)) !== 0))
  const group = new Map(pools.map((pool, k) => [pool, k]))
  for (const [a, b] of pairs(pools)) {
    if (group.get(a) === group.get(b)) continue
    const ratio = ratioOf(model, knowledge, a, b, telling, mixed)
    if (!ratio) continue
    const [from, to] = [group.get(a), group.get(b) as number]
    for (const [pool, its] of group) if (its === from) group.set(pool, to)
    for (const c of components)
      rows.push({ form: combine(1, poolPart(model, a, c), -ratio.value, poolPart(model, b, c)), restsOn: [ratio.form] })
  }
  return rows
}

/** True where the form is not already 0 in every solution. */
function moves(knowledge: Knowledge, form: LinearForm): boolean {
  const isNothing = (x: Vector, direction: boolean): boolean => {
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
  if (second) points.push(moved(generic, 1, second))
  if (second && third) points.push(moved(moved(generic, -0.7, second), 1.3, third))
  return points.every(({ value: x }) => {
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
function isPossible(ratio: number, a: number[], b: number[], mixed: number[]): boolean {
  const within = (left: number[], right: number[]): boolean => right === mixed || left.every((s) => right.includes(s))
  return ratio >= 0 && (ratio <= 1 || !within(a, b)) && (ratio >= 1 || !within(b, a))
}

/** The ratio of two pools where the totals or one component give it in every solution. */
function ratioOf(
  model: Model,
  knowledge: Knowledge,
  a: number[],
  b: number[],
  telling: number[],
  mixed: number[],
): { value: number; form: LinearForm } | undefined {
  const forms: [LinearForm, LinearForm][] = [
    [poolTotal(model, a), poolTotal(model, b)],
    ...telling.map((c): [LinearForm, LinearForm] => [poolPart(model, a, c), poolPart(model, b, c)]),
  ]
  for (const [numerator, denominator] of forms) {
    const value = knownMeasure(knowledge, { numerator, denominator })
    if (value !== undefined && isPossible(value, a, b, mixed))
      return { value, form: combine(1, numerator, -value, denominator) }
  }
  return undefined
}
