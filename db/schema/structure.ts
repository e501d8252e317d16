import { sql } from 'drizzle-orm'
import { index, pgTable, text } from 'drizzle-orm/pg-core'
import * as column from './columns'

/** The plant as drawn: components, streams, units and how they are joined. */
export const component = pgTable(
  'component',
  {
    ...column.keyColumns,
    tag: text('tag').notNull(),
    name: text('name').notNull(),
    formula: text('formula'),
    /** kg/kmol */
    molarMass: column.maybeNumber('molar_mass'),
    position: column.number('position'),
  },
  (t) => [column.keyOf('component', t), column.oneTag('component', t), column.aboveZero('component', t.molarMass)],
)

export const stream = pgTable(
  'stream',
  {
    ...column.keyColumns,
    tag: text('tag').notNull(),
    name: text('name').notNull(),
    phase: text('phase'),
    /** kg/m3 */
    density: column.maybeNumber('density'),
    temperature: text('temperature'),
    pressure: text('pressure'),
    fractions: text('fractions', { enum: ['asTyped', 'scale', 'difference'] }).notNull(),
    differenceComponentId: column.maybeReference('difference_component_id'),
    cannotMeasure: text('cannot_measure', { enum: ['flow', 'analysis', 'both'] }),
    note: text('note'),
    position: column.number('position'),
  },
  (t) => [
    column.keyOf('stream', t),
    column.oneTag('stream', t),
    column.aboveZero('stream', t.density),
    column.oneOf('stream', t.fractions, ['asTyped', 'scale', 'difference']),
    column.oneOf('stream', t.cannotMeasure, ['flow', 'analysis', 'both']),
    column.pointsAt('stream', t, t.differenceComponentId, component),
    column.holds(
      'stream',
      'difference_named',
      sql`(${t.fractions} = 'difference') = (${t.differenceComponentId} is not null)`,
    ),
  ],
)

export const absence = pgTable(
  'absence',
  {
    ...column.keyColumns,
    streamId: column.reference('stream_id'),
    componentId: column.reference('component_id'),
  },
  (t) => [
    column.keyOf('absence', t),
    column.pointsAt('absence', t, t.streamId, stream),
    column.pointsAt('absence', t, t.componentId, component),
    column.holds('absence', 'in_place', sql`${t.id} = ${t.streamId} || '/' || ${t.componentId}`),
    index('absence_stream_id_idx').on(t.bookId, t.streamId),
    index('absence_component_id_idx').on(t.bookId, t.componentId),
  ],
)

export const unit = pgTable(
  'unit',
  {
    ...column.keyColumns,
    tag: text('tag').notNull(),
    name: text('name').notNull(),
    unitKind: text('unit_kind', { enum: ['mixer', 'splitter', 'separator', 'reactor'] }).notNull(),
    balance: text('balance', { enum: ['components', 'elements'] }).notNull(),
    note: text('note'),
    position: column.number('position'),
  },
  (t) => [
    column.keyOf('unit', t),
    column.oneTag('unit', t),
    column.oneOf('unit', t.unitKind, ['mixer', 'splitter', 'separator', 'reactor']),
    column.oneOf('unit', t.balance, ['components', 'elements']),
  ],
)

export const inventory = pgTable(
  'inventory',
  {
    ...column.keyColumns,
    unitId: column.reference('unit_id'),
    componentId: column.maybeReference('component_id'),
    value: column.number('value'),
    unit: text('unit'),
    note: text('note'),
  },
  (t) => [
    column.keyOf('inventory', t),
    column.pointsAt('inventory', t, t.unitId, unit),
    column.pointsAt('inventory', t, t.componentId, component),
  ],
)

/** One end of a stream. Its key allows one source and one sink a stream. */
export const link = pgTable(
  'link',
  {
    ...column.keyColumns,
    streamId: column.reference('stream_id'),
    direction: text('direction', { enum: ['in', 'out'] }).notNull(),
    unitId: column.reference('unit_id'),
  },
  (t) => [
    column.keyOf('link', t),
    column.pointsAt('link', t, t.streamId, stream),
    column.pointsAt('link', t, t.unitId, unit),
    column.oneOf('link', t.direction, ['in', 'out']),
    column.holds('link', 'in_place', sql`${t.id} = ${t.streamId} || '/' || ${t.direction}`),
    index('link_stream_id_idx').on(t.bookId, t.streamId),
    index('link_unit_id_idx').on(t.bookId, t.unitId),
  ],
)
