import { CellState } from '@/lib/balance/solution'
import { formatNumber } from '@/lib/sheet/format'
import { type CellKey, plant, plantRows, type RowKind } from './plant'
import type { PlantView } from './plant-view'

export const stateWords: Record<CellState, string> = {
  [CellState.absent]: 'absent',
  [CellState.given]: 'given',
  [CellState.solvable]: 'solvable now',
  [CellState.unknown]: 'still unknown',
  [CellState.atOdds]: 'at odds',
}

export const stateClasses: Record<CellState, string> = {
  [CellState.absent]: 'cell-absent',
  [CellState.given]: 'cell-given',
  [CellState.solvable]: 'cell-solvable',
  [CellState.unknown]: 'cell-unknown',
  [CellState.atOdds]: 'cell-at-odds',
}

const placeOf = (key: CellKey) => {
  const [rowId, streamId] = key.split('/')
  return { row: plantRows.find((row) => row.id === rowId), stream: plant.streams.find((s) => s.id === streamId) }
}

/** "total flow of 2", "wt % alum in 2", "alum flow in 2". */
export function cellName(key: CellKey): string {
  const { row, stream } = placeOf(key)
  if (!row || !stream) return key
  const component = row.label.toLowerCase()
  if (row.kind === 'flow') return `total flow of ${stream.id}`
  if (row.kind === 'massFraction') return `wt % ${component} in ${stream.id}`
  return `${component} flow in ${stream.id}`
}

/** How far the table is and what closes it, in one or two sentences. */
export function howFar(view: PlantView): { lead: string; rest: string } {
  if (view.trouble) return { lead: view.trouble, rest: '' }
  if (view.clashes.length > 0)
    return { lead: 'These cannot all hold: ', rest: `${listed(view.clashes[0]?.map(cellName) ?? [])}.` }
  const negative = (Object.keys(view.cells) as CellKey[]).filter((key) => view.cells[key]?.negative)
  if (negative.length > 0)
    return {
      lead: 'It closes only with flows below zero: ',
      rest: `${listed(negative.map(cellName))}. The sums are right; one of the values typed is not, or a stream runs the other way.`,
    }
  const lead = `${view.solvable} cells follow`
  if (view.unknown === 0)
    return { lead, rest: ` from ${view.given} given. Nothing is still unknown: the table closes.` }
  const rest = ` from ${view.given} given; ${view.unknown} are still unknown.`
  return { lead, rest: view.closers.length > 0 ? `${rest} One more value closes it:` : rest }
}

/** "a, b and c" */
export function listed(items: readonly string[]): string {
  if (items.length < 2) return items.join('')
  return `${items.slice(0, -1).join(', ')} and ${items.at(-1)}`
}

/** A number of the table, as the workbench writes it. */
export function showNumber(value: number, kind: RowKind, typed: boolean): string {
  return formatNumber(value, kind === 'massFraction' ? 'percent' : 'flow', { typed })
}
