import { sql } from 'drizzle-orm'
import { index, pgTable, text } from 'drizzle-orm/pg-core'
import * as column from './columns'
import { measure, measureQuantities } from './measures'
import { component, stream } from './structure'

const quantities = [
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
const sourceKinds = ['design', 'meter', 'laboratory', 'assumption', 'difference'] as const
const uses = ['given', 'check', 'withdrawn'] as const

/** Operating cases of a book, and what people typed into each. */
export const operatingCase = pgTable(
  'operating_case',
  {
    ...column.keyColumns,
    name: text('name').notNull(),
    position: column.number('position'),
  },
  (t) => [
    column.keyOf('operating_case', t),
    column.holds('operating_case', 'named', sql`length(btrim(${t.name})) > 0`),
  ],
)

export const given = pgTable(
  'given',
  {
    ...column.keyColumns,
    caseId: column.reference('case_id'),
    streamId: column.reference('stream_id'),
    quantity: text('quantity', { enum: quantities }).notNull(),
    componentId: column.maybeReference('component_id'),
    measureId: column.maybeReference('measure_id'),
    instrument: text('instrument').notNull(),
    /** As typed, word for word. */
    text: text('text').notNull(),
    /** In `unit`; null: the text could not be read. */
    value: column.maybeNumber('value'),
    unit: text('unit'),
    halfWidth: column.maybeNumber('half_width'),
    sigma: column.maybeNumber('sigma'),
    use: text('use', { enum: uses }).notNull(),
    sourceKind: text('source_kind', { enum: sourceKinds }),
    source: text('source'),
    note: text('note'),
  },
  (t) => [
    column.keyOf('given', t),
    column.pointsAt('given', t, t.caseId, operatingCase),
    column.pointsAt('given', t, t.streamId, stream),
    column.pointsAt('given', t, t.componentId, component),
    column.pointsAt('given', t, t.measureId, measure),
    column.oneOf('given', t.quantity, quantities),
    column.oneOf('given', t.use, uses),
    column.oneOf('given', t.sourceKind, sourceKinds),
    column.holds(
      'given',
      'in_place',
      sql`${t.id} = concat_ws('/', ${t.caseId}, ${t.streamId}, ${t.quantity}, coalesce(${t.componentId}, ${t.measureId}, ''), ${t.instrument})`,
    ),
    column.aboveZero('given', t.halfWidth),
    column.aboveZero('given', t.sigma),
    column.holds(
      'given',
      'component_named',
      sql`(${t.quantity} in ('flow', 'massFlow', 'moleFlow', 'volumeFlow')) = (${t.componentId} is null and ${t.measureId} is null)`,
    ),
    column.holds(
      'given',
      'measure_named',
      sql`(${t.quantity} in (${column.list(measureQuantities)})) = (${t.measureId} is not null) and num_nonnulls(${t.componentId}, ${t.measureId}) < 2`,
    ),
    index('given_stream_id_idx').on(t.bookId, t.streamId),
    index('given_component_id_idx').on(t.bookId, t.componentId),
    index('given_measure_id_idx').on(t.bookId, t.measureId),
  ],
)
