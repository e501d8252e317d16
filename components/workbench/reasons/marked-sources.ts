import type { CellView, GridPlace, GridSource } from '@/hooks/grid-model'
import { CellState, slotOf } from '@/lib/balance/solution'
import type { BookView } from '../book-view'
import { directionAt } from '../links-source'
import { readRow } from '../rows'
import type { Explained, MarkedBoundary } from './explained'

const saying = (cell: CellView, words: string): CellView => ({
  ...cell,
  capped: true,
  label: `${cell.label}; ${words}`,
})

/** The stream table with a cap on the head of every stream that crosses the boundary. */
export function cappedTable(source: GridSource, view: BookView, boundary: MarkedBoundary): GridSource {
  const crossing = new Set(boundary.crossing)
  return {
    ...source,
    view: (place) => {
      const cell = source.view(place)
      const tag = place.row === 'tag' ? view.state.stream.get(place.column)?.tag.trim() : undefined
      return tag !== undefined && crossing.has(tag) ? saying(cell, 'crosses the boundary') : cell
    },
  }
}

/** The connections with a cap on the units inside and on every connection where the boundary is crossed. */
export function cappedLinks(source: GridSource, view: BookView, boundary: MarkedBoundary): GridSource {
  const crossing = new Set(boundary.crossing)
  const inside = new Set(boundary.units)
  return {
    ...source,
    view: (place) => {
      const cell = source.view(place)
      const unit = view.state.unit.get(place.row)
      if (!unit || !inside.has(unit.tag.trim())) return cell
      const stream = view.state.stream.get(place.column)
      if (!stream) return place.column === '#name' ? saying(cell, 'inside the boundary') : cell
      const crosses = crossing.has(stream.tag.trim()) && directionAt(view.state, unit.id, stream.id) !== null
      return crosses ? saying(cell, 'crosses the boundary') : cell
    },
  }
}

/** How a cell stands to the step that is looked at: found before it, by it, or later. */
export type WalkedState = 'before' | 'now' | 'later'

/** Where the cell stands in the walk; null for what the workings say nothing about (given, absent, unknown). */
export function walkedState(explained: Explained, { row, column }: GridPlace, at: number): WalkedState | null {
  const { solved, explanation } = explained
  const ref = readRow(row)
  const stream = solved.streamIndex.get(column)
  if (ref?.kind !== 'value' || stream === undefined) return null
  // A measure of its own is read off cells, so it comes once they all have come.
  if (ref.quantity === 'measure' || ref.quantity === 'volumeFlow')
    return at >= explanation.workings.length ? 'before' : 'later'
  const component = ref.componentId === null ? 0 : solved.componentIndex.get(ref.componentId)
  if (component === undefined) return null
  const slot = slotOf(solved.solution.nComponents, stream, ref.quantity, component)
  if (solved.solution.states[slot] !== CellState.solvable) return null
  const found = explanation.stepOfSlot[slot] ?? 0
  return found === 0 || found > at ? 'later' : found === at ? 'now' : 'before'
}

/** The stream table as it stands at a step: found before, solvable now by this step, the rest still unknown. */
export function walkedTable(
  source: GridSource,
  explained: Explained,
  at: number,
  tell: (sentence: string) => void,
): GridSource {
  const refuse = (): void => tell('You are walking through the workings: leave them (Esc) to edit.')
  const said = (label: string, words: string): string => label.replace(/solvable now/, words)
  return {
    ...source,
    mayEdit: () => false,
    isReadOnly: () => true,
    clear: refuse,
    paste: refuse,
    shift: refuse,
    view: (place) => {
      const cell = source.view(place)
      if (cell.tone !== 'solvable') return cell
      const state = walkedState(explained, place, at)
      if (state === 'before') return { ...cell, tone: 'plain', label: said(cell.label, 'known from an earlier step') }
      if (state !== 'later') return cell
      const where = cell.label.split(': ')[0] ?? cell.label
      return { ...cell, text: '·', tone: 'unknown', label: `${where}: still unknown at this step` }
    },
  }
}
