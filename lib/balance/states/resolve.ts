import { Tracer, tension } from '../conflicts/circuit'
import type { Model } from '../model'
import { turnComposition } from '../pending/composition'
import { type Pending, turnFormula, turnScaled } from '../pending/pending'
import type { TurnedRow } from '../pending/turned-row'
import type { Assembly } from '../rows/assemble'
import { compileRows } from '../sparse/compiled-rows'
import { eliminate } from '../sparse/elimination'
import { gatherKnowledge } from './knowledge'
import { openRows } from './open-rows'
import { type Blur, blurOf, randomChanges } from './random-change'
import type { Resolved, Round } from './resolved'
import { zeroSums } from './zero-sums'

/** Half-widths times this are rounding: such rows hold, however much a long chain of differences blurs them. */
export const AGREES_BY_FAR = 1e-6

/** Far above the longest chain of splitters; only a guard. */
const MOST_ROUNDS = 200

/**
 * Solves the rows, turns what has become linear into rows, fixes flows at 0 whose sum is 0, and solves again until
 * nothing changes. Stops where rows do not hold, unless `evenOpen`.
 */
export function resolve(model: Model, assembly: Assembly, evenOpen = false): Resolved {
  const { rows, nonNegative } = assembly
  const rounds: Round[] = []
  const restsOn = new Map<number, TurnedRow['restsOn']>()
  const blur: Blur = new Map()
  const fixedAtZero = new Set<number>()
  const freeWhenTurned = new Map<Pending, number>()
  const isOpen = (sofar: Resolved): boolean => {
    const open = openRows(sofar.knowledge)
    if (open.length === 0) return false
    const tracer = new Tracer(model, assembly, sofar)
    return open.some((row) => tension(tracer.ofDependent(row)) > AGREES_BY_FAR)
  }
  let left = assembly.pending
  const zero = rows.from({ type: 'zero' })
  for (let round = 0; ; round++) {
    const knowledge = gatherKnowledge(eliminate(compileRows(rows, model.nColumns), nonNegative, model.pivots))
    const firstRow = rows.count
    let changes: Float64Array[] | undefined
    const push = (source: number, { form, restsOn: forms }: TurnedRow): void => {
      if (form.columns.length === 0 && form.constant === 0) return
      const row = rows.push(source, form.columns, form.coefficients, 0 - form.constant)
      changes ??= randomChanges(assembly, knowledge, blur)
      restsOn.set(row, forms)
      blur.set(row, blurOf(forms, knowledge, changes))
    }
    // From rows that contradict each other nothing follows: what is at odds has to be settled first.
    if (round < MOST_ROUNDS && (evenOpen || !isOpen({ knowledge, left, rounds, restsOn, blur }))) {
      left = left.filter((item) => {
        if (item.kind === 'composition') {
          const { length } = knowledge.elimination.free
          const { rows: turned, settled } = turnComposition(model, knowledge, item.composition)
          // Rows that brought nothing the last time clash with others: adding them again would never end.
          if (turned.length === 0 || length >= (freeWhenTurned.get(item) ?? Number.POSITIVE_INFINITY)) return !settled
          for (const row of turned) push(item.source, row)
          freeWhenTurned.set(item, length)
          return !settled
        }
        const turned = item.kind === 'scaled' ? turnScaled(knowledge, item) : turnFormula(model, knowledge, item)
        if (turned) push(item.source, turned)
        return !turned
      })
      for (const { column, sum } of zeroSums(model, knowledge))
        if (!fixedAtZero.has(column)) {
          fixedAtZero.add(column)
          push(zero, { form: { columns: [column], coefficients: [1], constant: 0 }, restsOn: [sum] })
        }
    }
    if (rows.count === firstRow) return { knowledge, left, rounds, restsOn, blur }
    rounds.push({ knowledge, firstRow })
  }
}
