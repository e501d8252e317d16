import { measureKey } from '../measure/measure-name'
import type { MeasureName, Quantity } from '../problem'

/**
 * One equation that a step uses. `balance` and `total` are those of the step's boundary; with an `id` they are those of
 * that one unit inside it. `given` is a typed value, `sum` a stream's total as the sum of its components, `rule` a rule
 * by its id, `composition` the equality that a splitter or a rule (by its id) asks of the streams named with it.
 */
export type Use = Partial<MeasureName> & {
  equation: 'balance' | 'total' | 'sum' | 'given' | 'rule' | 'composition'
  stream?: string
  id?: string
}

/** A cell or an extent that a step gives, at its value in the exact answer. */
export type Find = { stream?: string; reaction?: string; quantity?: Quantity; component?: string; value: number }

/**
 * One step of the workings: from the equations it uses, what was typed and what earlier steps found, its finds follow.
 * `unknowns` are those in the equations it uses once typed values and earlier finds are put in; `equations` counts
 * balances, totals, sums, rules and compositions among them.
 */
export type Step = {
  /** From 1. */
  step: number
  kind: 'stream' | 'units' | 'rule' | 'simultaneous'
  /** Units inside; [] for a stream or a rule. */
  boundary: string[]
  stream?: string
  unknowns: number
  equations: number
  uses: Use[]
  finds: Find[]
}

export const sameUse = (use: Use): string =>
  JSON.stringify([use.equation, use.stream ?? null, use.id ?? null, measureKey(use)])
