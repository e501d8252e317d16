import { sql } from 'drizzle-orm'
import { pgTable, text } from 'drizzle-orm/pg-core'
import * as column from './columns'
import { component, stream, unit } from './structure'

const uses = ['given', 'check', 'withdrawn'] as const
const ruleKinds = [
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

/** What ties numbers together beside the balances: reactions, named parameters, rules. */
export const reaction = pgTable(
  'reaction',
  {
    ...column.keyColumns,
    tag: text('tag').notNull(),
    name: text('name').notNull(),
    unitId: column.reference('unit_id'),
    position: column.number('position'),
  },
  (t) => [column.keyOf('reaction', t), column.oneTag('reaction', t), column.pointsAt('reaction', t, t.unitId, unit)],
)

export const coefficient = pgTable(
  'coefficient',
  {
    ...column.keyColumns,
    reactionId: column.reference('reaction_id'),
    componentId: column.reference('component_id'),
    /** Negative: consumed. */
    value: column.number('value'),
  },
  (t) => [
    column.keyOf('coefficient', t),
    column.pointsAt('coefficient', t, t.reactionId, reaction),
    column.pointsAt('coefficient', t, t.componentId, component),
    column.holds('coefficient', 'in_place', sql`${t.id} = ${t.reactionId} || '/' || ${t.componentId}`),
  ],
)

export const parameter = pgTable(
  'parameter',
  {
    ...column.keyColumns,
    tag: text('tag').notNull(),
    value: column.maybeNumber('value'),
    note: text('note'),
    position: column.number('position'),
  },
  (t) => [column.keyOf('parameter', t), column.oneTag('parameter', t)],
)

export const rule = pgTable(
  'rule',
  {
    ...column.keyColumns,
    tag: text('tag').notNull(),
    ruleKind: text('rule_kind', { enum: ruleKinds }).notNull(),
    use: text('use', { enum: uses }).notNull(),
    unitId: column.maybeReference('unit_id'),
    streamId: column.maybeReference('stream_id'),
    componentId: column.maybeReference('component_id'),
    otherStreamId: column.maybeReference('other_stream_id'),
    otherComponentId: column.maybeReference('other_component_id'),
    reactionId: column.maybeReference('reaction_id'),
    value: column.maybeNumber('value'),
    parameterId: column.maybeReference('parameter_id'),
    text: text('text'),
    halfWidth: column.maybeNumber('half_width'),
    note: text('note'),
    position: column.number('position'),
  },
  (t) => [
    column.keyOf('rule', t),
    column.oneTag('rule', t),
    column.oneOf('rule', t.ruleKind, ruleKinds),
    column.oneOf('rule', t.use, uses),
    column.aboveZero('rule', t.halfWidth),
    column.pointsAt('rule', t, t.unitId, unit),
    column.pointsAt('rule', t, t.streamId, stream),
    column.pointsAt('rule', t, t.componentId, component),
    column.pointsAt('rule', t, t.otherStreamId, stream),
    column.pointsAt('rule', t, t.otherComponentId, component),
    column.pointsAt('rule', t, t.reactionId, reaction),
    column.pointsAt('rule', t, t.parameterId, parameter),
  ],
)

/** A stream of a rule that names several. */
export const ruleStream = pgTable(
  'rule_stream',
  {
    ...column.keyColumns,
    ruleId: column.reference('rule_id'),
    streamId: column.reference('stream_id'),
  },
  (t) => [
    column.keyOf('rule_stream', t),
    column.pointsAt('rule_stream', t, t.ruleId, rule),
    column.pointsAt('rule_stream', t, t.streamId, stream),
    column.holds('rule_stream', 'in_place', sql`${t.id} = ${t.ruleId} || '/' || ${t.streamId}`),
  ],
)
