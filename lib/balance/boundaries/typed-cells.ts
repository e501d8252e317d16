import type { Settled } from '../conflicts/find-conflicts'
import type { Model } from '../model'
import { cellQuantityOf } from '../states/cells'

/** What is typed of the book's own basis, as boundaries count it. */
export type TypedCells = {
  /** 1 where the stream's flow is typed; length nStreams. */
  flow: Uint8Array
  /** 1 where the fraction is typed, at s * nComponents + c. */
  fraction: Uint8Array
  /** 1 where a rule holds the extent; by reaction. */
  extent: Uint8Array
  /** Typed values, by stream and by s * nComponents + c, in the book's units. */
  flowValue: Map<number, number>
  fractionValue: Map<number, number>
  /** Stream and component of each column, -1 where it has none; length nColumns. */
  start: { streamOf: Int32Array; componentOf: Int32Array }
}

export function typedCells(model: Model, { assembly }: Settled): TypedCells {
  const n = model.nComponents
  const typed: TypedCells = {
    flow: new Uint8Array(model.nStreams),
    fraction: new Uint8Array(model.nStreams * n),
    extent: new Uint8Array(model.reactions.length),
    flowValue: new Map(),
    fractionValue: new Map(),
    start: columnPlaces(model),
  }
  for (const { given, stream, component, value } of assembly.givens) {
    const quantity = cellQuantityOf(model, given.quantity)
    if (quantity === 'flow') {
      typed.flow[stream] = 1
      typed.flowValue.set(stream, value)
    }
    if (quantity === 'fraction') {
      typed.fraction[stream * n + component] = 1
      typed.fractionValue.set(stream * n + component, value)
    }
  }
  for (const rule of model.problem.relations ?? [])
    if (rule.kind === 'extent' && (rule.use ?? 'given') === 'given' && isFixed(model, rule.value))
      typed.extent[model.reactionIndex.get(rule.reaction) as number] = 1
  return typed
}

function columnPlaces(model: Model): TypedCells['start'] {
  const start = {
    streamOf: new Int32Array(model.nColumns).fill(-1),
    componentOf: new Int32Array(model.nColumns).fill(-1),
  }
  for (let s = 0; s < model.nStreams; s++) {
    for (const column of [model.totalColumn[s] as number, model.otherTotalColumn[s] as number])
      if (column >= 0) start.streamOf[column] = s
    for (const c of model.present[s] as number[]) {
      const column = model.flowColumn[s * model.nComponents + c] as number
      start.streamOf[column] = s
      start.componentOf[column] = c
    }
  }
  return start
}

const isFixed = (model: Model, value: number | { parameter: string }): boolean =>
  typeof value === 'number' ||
  model.problem.parameters?.[model.parameterIndex.get(value.parameter) as number]?.value !== undefined

/** A given that a boundary counts as a rule: neither a flow nor a fraction of the book's basis. */
export function countsAsRule(model: Model, quantity: Parameters<typeof cellQuantityOf>[1]): boolean {
  const cell = cellQuantityOf(model, quantity)
  return cell !== 'flow' && cell !== 'fraction'
}
