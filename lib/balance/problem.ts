/**
 * The problem file `tallybrook/1`: one operating case of one book, and the only thing the solver takes.
 * Flows are in the book's flow unit, fractions are of 1 unless a given or rule carries its own unit.
 * A value of this type has passed `parseProblem` of lib/book (ids known and unique, measures computable).
 */
export type Basis = 'mass' | 'mole'

export type Component = { id: string; name?: string; formula?: string; molarMass?: number /* kg/kmol */ }

export type Stream = {
  id: string
  name?: string
  /** Components that can be present; left out: all of the book. */
  components?: string[]
  /** kg/m3 */
  density?: number
  fractions?: 'asTyped' | 'scale' | { difference: string }
  note?: string
}

export type UnitKind = 'mixer' | 'splitter' | 'separator' | 'reactor'

export type Unit = {
  id: string
  name?: string
  kind: UnitKind
  balance?: 'components' | 'elements'
  /** Gain of what the unit holds, per unit of time; without a component, of the total. */
  inventory?: { component?: string; value: number; unit?: string }[]
}

export type Direction = 'in' | 'out'

export type Reaction = { id: string; unit: string; name?: string; stoichiometry: Record<string, number> }

export type Parameter = { id: string; value?: number }

export type Quantity =
  | 'flow'
  | 'componentFlow'
  | 'massFlow'
  | 'moleFlow'
  | 'componentMassFlow'
  | 'componentMoleFlow'
  | 'volumeFlow'
  | 'massFraction'
  | 'moleFraction'
  | ExtraQuantity

/** Ratios that a stream and a component do not name alone: the further keys of `MeasureName` say of what. */
export type ExtraQuantity =
  | 'dryMassFraction'
  | 'dryMoleFraction'
  | 'elementMassFraction'
  | 'groupMassRatio'
  | 'groupMoleRatio'

/** What names a measure of any stream. Lists name components; one that cannot be in the stream counts as none of it. */
export type MeasureName = {
  quantity: Quantity
  component?: string
  /** Dry fractions: the component over all of the stream but these. The component may be one of them (kg water per kg dry). */
  without?: string[]
  /** elementMassFraction: the mass of this element, by the formulas, over the whole stream. */
  element?: string
  /** Group ratios: the sum of these … */
  parts?: string[]
  /** … over the sum of these; left out: over the whole stream. */
  over?: string[]
}

export type Use = 'given' | 'check' | 'withdrawn'

export type SourceKind = 'design' | 'meter' | 'laboratory' | 'assumption' | 'difference'

export type Given = MeasureName & {
  stream: string
  value: number
  /** Flows: the book's flow unit when left out; fractions and ratios: 1. */
  unit?: string
  /** In the given's unit, > 0. */
  halfWidth?: number
  sigma?: number
  use?: Use
  /** Default 'main'. */
  instrument?: string
  kind?: SourceKind
  source?: string
  note?: string
}

export type Value = number | { parameter: string }

export type RuleBody =
  | { kind: 'split'; unit: string; stream: string; value: Value }
  | { kind: 'recovery'; unit: string; component: string; stream: string; value: Value }
  | { kind: 'conversion'; unit: string; component: string; value: Value }
  | { kind: 'flowRatio'; stream: string; of: string; value: Value }
  | {
      kind: 'componentRatio'
      stream: string
      component: string
      of: { stream: string; component: string }
      value: Value
    }
  | { kind: 'extent'; reaction: string; value: Value }
  | { kind: 'yield'; unit: string; product: string; from: string; value: Value }
  | { kind: 'selectivity'; unit: string; product: string; over: string; value: Value }
  | { kind: 'excess'; unit: string; component: string; reaction: string; limiting: string; value: Value }
  | { kind: 'sameComposition'; streams: string[] }
  | { kind: 'formula'; text: string }

export type Rule = { id: string; use?: Use; halfWidth?: number; note?: string } & RuleBody

export type Problem = {
  format: 'tallybrook/1'
  name: string
  basis: Basis
  flowUnit: string
  components: Component[]
  streams: Stream[]
  units: Unit[]
  /** unit id -> stream id -> direction */
  links: Record<string, Record<string, Direction>>
  reactions?: Reaction[]
  parameters?: Parameter[]
  givens?: Given[]
  relations?: Rule[]
}
