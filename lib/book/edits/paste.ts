import type { BookState } from '../state'
import { counted, type Edit, type MakeId, together } from './draft'
import { type FieldsOf, renameTag, setManyFields } from './fields'
import { type GivenCell, setGivens } from './givens'
import { type LinkCell, setLinks } from './links'
import type { ListedKind } from './tags'

/** One cell of a pasted, filled or cleared block, by what it stands for. */
export type BlockCell =
  | ({ is: 'given' } & GivenCell)
  | ({ is: 'link' } & LinkCell)
  | { is: 'fields'; of: FieldsOf }
  | { is: 'tag'; kind: ListedKind; id: string; tag: string }

/** A block of cells as one change, and one step of undo. One cell refused refuses the block, and the reason names it. */
export function setBlock(
  state: BookState,
  cells: readonly BlockCell[],
  makeId: MakeId,
  label = `${counted(cells.length, 'cell')} pasted`,
): Edit {
  const givens = cells.filter((cell) => cell.is === 'given')
  const links = cells.filter((cell) => cell.is === 'link')
  const fields = cells.flatMap((cell) => (cell.is === 'fields' ? [cell.of] : []))
  const steps: ((current: BookState) => Edit)[] = []
  for (const cell of cells)
    if (cell.is === 'tag') steps.push((current) => renameTag(current, cell.kind, cell.id, cell.tag, makeId))
  if (fields.length > 0) steps.push((current) => setManyFields(current, fields, makeId))
  if (links.length > 0) steps.push((current) => setLinks(current, links, makeId))
  if (givens.length > 0) steps.push((current) => setGivens(current, givens, makeId))
  return together(state, makeId, label, steps)
}
