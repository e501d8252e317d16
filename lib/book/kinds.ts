import { z } from 'zod'
import { absenceId, coefficientId, givenId, linkId, measurePartId, ruleStreamId } from './ids'

/**
 * Every kind of record of a book: its zod schema, which fields point at which other kind, and, where the place of a
 * record is its identity, how its id follows from its fields. `apply`, `check` and the database writer know only this table.
 * Fields are flat primitives, so that a field is a column and a change is a diff of fields.
 */
const id = z.string().min(1).max(160)
const tag = z.string().trim().min(1, 'needs a tag').max(40, 'is longer than 40 characters')
const name = z.string().max(200)
const note = z.string().max(2000).nullable()
const finite = z.number()
const positive = z.number().positive()
const position = finite
const ref = z.string().min(1).max(40)
const use = z.enum(['given', 'check', 'withdrawn'])

/** Quantities that a `measure` record says the rest of. */
export const measureQuantities = [
  'dryMassFraction',
  'dryMoleFraction',
  'elementMassFraction',
  'groupMassRatio',
  'groupMoleRatio',
] as const

export const quantities = [
  'flow',
  'componentFlow',
  'massFlow',
  'moleFlow',
  'componentMassFlow',
  'componentMoleFlow',
  'volumeFlow',
  'massFraction',
  'moleFraction',
  ...measureQuantities,
] as const

export const sourceKinds = ['design', 'meter', 'laboratory', 'assumption', 'difference'] as const
export const unitKinds = ['mixer', 'splitter', 'separator', 'reactor'] as const
export const ruleKinds = [
  'split',
  'recovery',
  'conversion',
  'flowRatio',
  'componentRatio',
  'extent',
  'yield',
  'selectivity',
  'excess',
  'sameComposition',
  'formula',
] as const

export const bookSchema = z.strictObject({
  kind: z.literal('book'),
  id,
  name: z.string().trim().min(1, 'needs a name').max(200),
  description: z.string().max(2000),
  documentNumber: z.string().max(100),
  basis: z.enum(['mass', 'mole']),
  /** The unit that totals and component flows are shown in. */
  flowUnit: z.string().min(1).max(40),
})

export const componentSchema = z.strictObject({
  kind: z.literal('component'),
  id,
  tag,
  name,
  formula: z.string().max(200).nullable(),
  /** kg/kmol; null: from the formula, or not known. */
  molarMass: positive.nullable(),
  position,
})

export const streamSchema = z.strictObject({
  kind: z.literal('stream'),
  id,
  tag,
  name,
  phase: z.string().max(40).nullable(),
  /** kg/m3 */
  density: positive.nullable(),
  /** Carried notes, as typed with their unit; no calculation uses them. */
  temperature: z.string().max(40).nullable(),
  pressure: z.string().max(40).nullable(),
  /** What to do with typed fractions that do not add up: the person's choice. */
  fractions: z.enum(['asTyped', 'scale', 'difference']),
  differenceComponentId: ref.nullable(),
  /** What cannot be measured at it, for the list of what to measure next; left out in changes older than this mark. */
  cannotMeasure: z.enum(['flow', 'analysis', 'both']).nullish(),
  note,
  position,
})

/** The component cannot be in the stream. No record: it can. */
export const absenceSchema = z.strictObject({ kind: z.literal('absence'), id, streamId: ref, componentId: ref })

export const unitSchema = z.strictObject({
  kind: z.literal('unit'),
  id,
  tag,
  name,
  unitKind: z.enum(unitKinds),
  balance: z.enum(['components', 'elements']),
  note,
  position,
})

export const inventorySchema = z.strictObject({
  kind: z.literal('inventory'),
  id,
  unitId: ref,
  /** null: of the total */
  componentId: ref.nullable(),
  value: finite,
  /** null: the book's flow unit */
  unit: z.string().max(40).nullable(),
  note,
})

/** One end of a stream: 'out' is its source (it comes out of the unit), 'in' its sink. */
export const linkSchema = z.strictObject({
  kind: z.literal('link'),
  id,
  streamId: ref,
  direction: z.enum(['in', 'out']),
  unitId: ref,
})

export const reactionSchema = z.strictObject({ kind: z.literal('reaction'), id, tag, name, unitId: ref, position })

export const coefficientSchema = z.strictObject({
  kind: z.literal('coefficient'),
  id,
  reactionId: ref,
  componentId: ref,
  /** Negative: consumed. */
  value: finite,
})

export const parameterSchema = z.strictObject({
  kind: z.literal('parameter'),
  id,
  tag,
  /** null: free */
  value: finite.nullable(),
  note,
  position,
})

export const ruleSchema = z.strictObject({
  kind: z.literal('rule'),
  id,
  tag,
  ruleKind: z.enum(ruleKinds),
  use,
  unitId: ref.nullable(),
  streamId: ref.nullable(),
  /** The component, or the product formed. */
  componentId: ref.nullable(),
  /** flowRatio, componentRatio: the stream compared with. */
  otherStreamId: ref.nullable(),
  /** componentRatio: of; yield: from; selectivity: over; excess: limiting. */
  otherComponentId: ref.nullable(),
  reactionId: ref.nullable(),
  value: finite.nullable(),
  parameterId: ref.nullable(),
  /** formula */
  text: z.string().max(2000).nullable(),
  halfWidth: positive.nullable(),
  note,
  position,
})

/** A stream of a sameComposition rule. */
export const ruleStreamSchema = z.strictObject({ kind: z.literal('ruleStream'), id, ruleId: ref, streamId: ref })

/** A row of the stream table that people add: a measure of every stream with groups or an element of its own. */
export const measureSchema = z.strictObject({
  kind: z.literal('measure'),
  id,
  /** Empty: called after what it is. */
  name,
  quantity: z.enum(measureQuantities),
  /** Dry fractions. */
  componentId: ref.nullable(),
  element: z.string().min(1).max(3).nullable(),
  /** Group ratios: over the whole stream, or over the parts of side 'over'. */
  over: z.enum(['stream', 'group']),
  /** The unit that the row shows. */
  unit: z.string().min(1).max(40),
  position,
})

/** A component of one of a measure's groups. */
export const measurePartSchema = z.strictObject({
  kind: z.literal('measurePart'),
  id,
  measureId: ref,
  side: z.enum(['without', 'group', 'over']),
  componentId: ref,
})

export const caseSchema = z.strictObject({
  kind: z.literal('case'),
  id,
  name: z.string().trim().min(1, 'needs a name').max(100),
  position,
})

export const givenSchema = z.strictObject({
  kind: z.literal('given'),
  id,
  caseId: ref,
  streamId: ref,
  quantity: z.enum(quantities),
  componentId: ref.nullable(),
  /** The row of a quantity that a measure record says the rest of; left out in changes older than such rows. */
  measureId: ref.nullish(),
  instrument: z.string().min(1).max(40),
  /** What was typed, kept word for word. */
  text: z.string().max(400),
  /** In `unit`; null: the text could not be read. It stays in its cell, marked, and the solver leaves it out. */
  value: finite.nullable(),
  /** null: the book's flow unit, or for a fraction 1. */
  unit: z.string().max(40).nullable(),
  halfWidth: positive.nullable(),
  sigma: positive.nullable(),
  use,
  sourceKind: z.enum(sourceKinds).nullable(),
  source: z.string().max(400).nullable(),
  note,
})

type Schemas = typeof schemas
export const schemas = {
  book: bookSchema,
  component: componentSchema,
  stream: streamSchema,
  absence: absenceSchema,
  unit: unitSchema,
  inventory: inventorySchema,
  link: linkSchema,
  reaction: reactionSchema,
  coefficient: coefficientSchema,
  parameter: parameterSchema,
  rule: ruleSchema,
  ruleStream: ruleStreamSchema,
  measure: measureSchema,
  measurePart: measurePartSchema,
  case: caseSchema,
  given: givenSchema,
} as const

export type Kind = keyof Schemas
export type RecordOf<K extends Kind> = z.infer<Schemas[K]>
export type BookRecord = { [K in Kind]: RecordOf<K> }[Kind]
export type FieldValue = string | number | null

/** In an order in which each kind comes after those it points at: write in this order, remove in the reverse. */
export const kindOrder = Object.keys(schemas) as Kind[]

export const recordSchema = z.discriminatedUnion('kind', [
  bookSchema,
  componentSchema,
  streamSchema,
  absenceSchema,
  unitSchema,
  inventorySchema,
  linkSchema,
  reactionSchema,
  coefficientSchema,
  parameterSchema,
  ruleSchema,
  ruleStreamSchema,
  measureSchema,
  measurePartSchema,
  caseSchema,
  givenSchema,
])

/** Field -> kind it points at. */
export const references: { readonly [K in Kind]: Readonly<Record<string, Kind>> } = {
  book: {},
  component: {},
  stream: { differenceComponentId: 'component' },
  absence: { streamId: 'stream', componentId: 'component' },
  unit: {},
  inventory: { unitId: 'unit', componentId: 'component' },
  link: { streamId: 'stream', unitId: 'unit' },
  reaction: { unitId: 'unit' },
  coefficient: { reactionId: 'reaction', componentId: 'component' },
  parameter: {},
  rule: {
    unitId: 'unit',
    streamId: 'stream',
    componentId: 'component',
    otherStreamId: 'stream',
    otherComponentId: 'component',
    reactionId: 'reaction',
    parameterId: 'parameter',
  },
  ruleStream: { ruleId: 'rule', streamId: 'stream' },
  measure: { componentId: 'component' },
  measurePart: { measureId: 'measure', componentId: 'component' },
  case: {},
  given: { caseId: 'case', streamId: 'stream', componentId: 'component', measureId: 'measure' },
}

/** Fields of each kind besides `kind` and `id`, in schema order. */
export const fieldsOf: { readonly [K in Kind]: readonly string[] } = Object.fromEntries(
  kindOrder.map((kind) => [kind, Object.keys(schemas[kind].shape).filter((f) => f !== 'kind' && f !== 'id')]),
) as never

/** The id that a record's place asks for, or undefined where the id is free. Its fields can then not be updated. */
export function placeId(record: BookRecord): string | undefined {
  switch (record.kind) {
    case 'absence':
      return absenceId(record.streamId, record.componentId)
    case 'link':
      return linkId(record.streamId, record.direction)
    case 'coefficient':
      return coefficientId(record.reactionId, record.componentId)
    case 'ruleStream':
      return ruleStreamId(record.ruleId, record.streamId)
    case 'measurePart':
      return measurePartId(record.measureId, record.side, record.componentId)
    case 'given': {
      const { caseId, streamId, quantity, componentId, measureId, instrument } = record
      return givenId(caseId, streamId, quantity, componentId ?? measureId ?? null, instrument)
    }
    default:
      return undefined
  }
}

/** What a kind is called in a sentence. */
export const kindNames: { readonly [K in Kind]: string } = {
  book: 'book',
  component: 'component',
  stream: 'stream',
  absence: 'absent component',
  unit: 'unit',
  inventory: 'inventory change',
  link: 'connection',
  reaction: 'reaction',
  coefficient: 'stoichiometric coefficient',
  parameter: 'parameter',
  rule: 'rule',
  ruleStream: 'stream of a rule',
  measure: 'row',
  measurePart: 'component of a row',
  case: 'operating case',
  given: 'given',
}
