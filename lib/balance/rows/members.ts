import type { LinearForm } from '../measure/measure'
import type { Model } from '../model'

/** A given by its index, a rule by the number of givens plus its index: what can be at odds. */
export type Member = number
export const memberOfRule = (model: Model, index: number): Member => (model.problem.givens?.length ?? 0) + index

/** Changes to the rows for asking what follows without some, or with other values. */
export type AssemblyOptions = {
  leaveOut?: ReadonlySet<Member>
  /** Values in place of those typed: what rounding settles on. */
  adjusted?: ReadonlyMap<Member, number>
  /** Fractions that do not add up are scaled, so that what hangs on them can still be seen. */
  scaleFractions?: boolean
  /** Changes every value but 0 and 1 a little, to tell what holds by chance of the numbers from what always holds. */
  perturb?: (value: number) => number
  /** Flows held at 1: a block without any typed flow shows its gaps only at some flow. */
  basis?: readonly LinearForm[]
}
