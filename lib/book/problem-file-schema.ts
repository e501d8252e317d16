import { z } from 'zod'

/** The problem file `tallybrook/1` as zod 4 objects that refuse unknown keys; what each key means stands in lib/balance/problem.ts. */
const id = z.string().min(1).max(40)
const positive = z.number().positive()
const use = z.enum(['given', 'check', 'withdrawn'])
const value = z.union([z.number(), z.strictObject({ parameter: id })])

const component = z.strictObject({
  id,
  name: z.string().optional(),
  formula: z.string().optional(),
  molarMass: positive.optional(),
})

const stream = z.strictObject({
  id,
  name: z.string().optional(),
  components: z.array(id).optional(),
  density: positive.optional(),
  fractions: z.union([z.enum(['asTyped', 'scale']), z.strictObject({ difference: id })]).optional(),
  note: z.string().optional(),
})

const unit = z.strictObject({
  id,
  name: z.string().optional(),
  kind: z.enum(['mixer', 'splitter', 'separator', 'reactor']),
  balance: z.enum(['components', 'elements']).optional(),
  inventory: z
    .array(z.strictObject({ component: id.optional(), value: z.number(), unit: z.string().optional() }))
    .optional(),
})

const reaction = z.strictObject({
  id,
  unit: id,
  name: z.string().optional(),
  stoichiometry: z.record(z.string(), z.number()),
})

const quantity = z.enum([
  'flow',
  'componentFlow',
  'massFlow',
  'moleFlow',
  'componentMassFlow',
  'componentMoleFlow',
  'volumeFlow',
  'massFraction',
  'moleFraction',
  'dryMassFraction',
  'dryMoleFraction',
  'elementMassFraction',
  'groupMassRatio',
  'groupMoleRatio',
])

const given = z.strictObject({
  stream: id,
  quantity,
  component: id.optional(),
  without: z.array(id).min(1).optional(),
  element: z.string().min(1).max(3).optional(),
  parts: z.array(id).min(1).optional(),
  over: z.array(id).min(1).optional(),
  value: z.number(),
  unit: z.string().optional(),
  halfWidth: positive.optional(),
  sigma: positive.optional(),
  use: use.optional(),
  instrument: z.string().min(1).max(40).optional(),
  kind: z.enum(['design', 'meter', 'laboratory', 'assumption', 'difference']).optional(),
  source: z.string().optional(),
  note: z.string().optional(),
})

const rule = { id, use: use.optional(), halfWidth: positive.optional(), note: z.string().optional() }

const relation = z.discriminatedUnion('kind', [
  z.strictObject({ ...rule, kind: z.literal('split'), unit: id, stream: id, value }),
  z.strictObject({ ...rule, kind: z.literal('recovery'), unit: id, component: id, stream: id, value }),
  z.strictObject({ ...rule, kind: z.literal('conversion'), unit: id, component: id, value }),
  z.strictObject({ ...rule, kind: z.literal('flowRatio'), stream: id, of: id, value }),
  z.strictObject({
    ...rule,
    kind: z.literal('componentRatio'),
    stream: id,
    component: id,
    of: z.strictObject({ stream: id, component: id }),
    value,
  }),
  z.strictObject({ ...rule, kind: z.literal('extent'), reaction: id, value }),
  z.strictObject({ ...rule, kind: z.literal('yield'), unit: id, product: id, from: id, value }),
  z.strictObject({ ...rule, kind: z.literal('selectivity'), unit: id, product: id, over: id, value }),
  z.strictObject({
    ...rule,
    kind: z.literal('excess'),
    unit: id,
    component: id,
    reaction: id,
    limiting: id,
    value,
  }),
  z.strictObject({ ...rule, kind: z.literal('sameComposition'), streams: z.array(id).min(2) }),
  z.strictObject({ ...rule, kind: z.literal('formula'), text: z.string().min(1) }),
])

export const problemSchema = z.strictObject({
  format: z.literal('tallybrook/1'),
  name: z.string(),
  basis: z.enum(['mass', 'mole']),
  flowUnit: z.string(),
  components: z.array(component),
  streams: z.array(stream),
  units: z.array(unit),
  links: z.record(z.string(), z.record(z.string(), z.enum(['in', 'out']))),
  reactions: z.array(reaction).optional(),
  parameters: z.array(z.strictObject({ id, value: z.number().optional() })).optional(),
  givens: z.array(given).optional(),
  relations: z.array(relation).optional(),
})

/** The same contract as JSON Schema, for documentation and other programs. */
export const problemJsonSchema = (): Record<string, unknown> =>
  z.toJSONSchema(problemSchema) as unknown as Record<string, unknown>
