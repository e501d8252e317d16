import type { Given, Problem } from '@/lib/balance/problem'

/** The little plant of the front page. Invented: an alum crystalliser with its mother liquor returned to the blend tank. */
export const plant = {
  format: 'tallybrook/1',
  name: 'Alum crystalliser (invented)',
  basis: 'mass',
  flowUnit: 'kg/h',
  components: [
    { id: 'alum', name: 'Alum' },
    { id: 'water', name: 'Water' },
  ],
  streams: [
    { id: '1', name: 'Fresh liquor' },
    { id: '2', name: 'Blended liquor' },
    { id: '3', name: 'Vapour', components: ['water'] },
    { id: '4', name: 'Wet crystals' },
    { id: '5', name: 'Mother liquor' },
  ],
  units: [
    { id: 'B-1', name: 'Blend tank', kind: 'mixer' },
    { id: 'C-2', name: 'Crystalliser', kind: 'separator' },
  ],
  links: {
    'B-1': { '1': 'in', '5': 'in', '2': 'out' },
    'C-2': { '2': 'in', '3': 'out', '4': 'out', '5': 'out' },
  },
} as const satisfies Problem

export type RowKind = 'flow' | 'massFraction' | 'componentFlow'
export type PlantRow = { id: string; kind: RowKind; component?: string; label: string; unit: string }

/** The rows of the table, top to bottom. */
export const plantRows: readonly PlantRow[] = [
  { id: 'flow', kind: 'flow', label: 'Total flow', unit: 'kg/h' },
  { id: 'x-alum', kind: 'massFraction', component: 'alum', label: 'Alum', unit: 'wt %' },
  { id: 'x-water', kind: 'massFraction', component: 'water', label: 'Water', unit: 'wt %' },
  { id: 'n-alum', kind: 'componentFlow', component: 'alum', label: 'Alum', unit: 'kg/h' },
  { id: 'n-water', kind: 'componentFlow', component: 'water', label: 'Water', unit: 'kg/h' },
]

/** `row/stream`: where a cell stands. */
export type CellKey = `${string}/${string}`
export const cellKey = (row: PlantRow, stream: string): CellKey => `${row.id}/${stream}`

/** What is typed, by cell. */
export type TypedValue = { value: number; unit: string }
export type Typed = ReadonlyMap<CellKey, TypedValue>

/** What is typed when the page opens: all but the one value that closes the recycle. */
export const typedAtFirst: Typed = new Map<CellKey, TypedValue>([
  ['flow/1', { value: 1200, unit: 'kg/h' }],
  ['x-alum/1', { value: 18, unit: '%' }],
  ['x-alum/4', { value: 96, unit: '%' }],
  ['x-alum/5', { value: 36, unit: '%' }],
])

/** The value that a visitor is asked to try. */
export const invitation: { key: CellKey; value: number } = { key: 'x-alum/2', value: 26 }

/** The plant with what is typed as its givens. */
export function problemOf(typed: Typed): Problem {
  const givens: Given[] = []
  for (const row of plantRows)
    for (const stream of plant.streams) {
      const entry = typed.get(cellKey(row, stream.id))
      if (!entry) continue
      givens.push({
        stream: stream.id,
        quantity: row.kind,
        ...(row.component ? { component: row.component } : {}),
        value: entry.value,
        unit: entry.unit,
      })
    }
  return { ...plant, givens } as unknown as Problem
}
