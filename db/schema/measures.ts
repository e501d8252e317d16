import { sql } from 'drizzle-orm'
import { index, pgTable, text } from 'drizzle-orm/pg-core'
import * as column from './columns'
import { component } from './structure'

export const measureQuantities = [
  'dryMassFraction',
  'dryMoleFraction',
  'elementMassFraction',
  'groupMassRatio',
  'groupMoleRatio',
] as const
const sides = ['without', 'group', 'over'] as const

/** Rows that people add to the stream table: what each is of. */
export const measure = pgTable(
  'measure',
  {
    ...column.keyColumns,
    name: text('name').notNull(),
    quantity: text('quantity', { enum: measureQuantities }).notNull(),
    componentId: column.maybeReference('component_id'),
    element: text('element'),
    over: text('over', { enum: ['stream', 'group'] }).notNull(),
    unit: text('unit').notNull(),
    position: column.number('position'),
  },
  (t) => [
    column.keyOf('measure', t),
    column.pointsAt('measure', t, t.componentId, component),
    column.oneOf('measure', t.quantity, measureQuantities),
    column.oneOf('measure', t.over, ['stream', 'group']),
    column.holds(
      'measure',
      'component_named',
      sql`(${t.quantity} in ('dryMassFraction', 'dryMoleFraction')) = (${t.componentId} is not null)`,
    ),
    column.holds('measure', 'element_named', sql`(${t.quantity} = 'elementMassFraction') = (${t.element} is not null)`),
  ],
)

/** A component of one of the groups of such a row. */
export const measurePart = pgTable(
  'measure_part',
  {
    ...column.keyColumns,
    measureId: column.reference('measure_id'),
    side: text('side', { enum: sides }).notNull(),
    componentId: column.reference('component_id'),
  },
  (t) => [
    column.keyOf('measure_part', t),
    column.pointsAt('measure_part', t, t.measureId, measure),
    column.pointsAt('measure_part', t, t.componentId, component),
    column.oneOf('measure_part', t.side, sides),
    column.holds(
      'measure_part',
      'in_place',
      sql`${t.id} = concat_ws('/', ${t.measureId}, ${t.side}, ${t.componentId})`,
    ),
    index('measure_part_measure_id_idx').on(t.bookId, t.measureId),
    index('measure_part_component_id_idx').on(t.bookId, t.componentId),
  ],
)
