import type { GridPlace, GridRange } from '@/hooks/grid-model'
import { NAME_COLUMN, UNIT_COLUMN } from '@/hooks/grid-model'
import { addStreams } from '@/lib/book/edits/add'
import { counted, type Edit, together } from '@/lib/book/edits/draft'
import { setGivens } from '@/lib/book/edits/givens'
import { setPresence } from '@/lib/book/edits/presence'
import { newId } from '@/lib/book/ids'
import { type BookState, inOrder } from '@/lib/book/state'
import { type ClipboardBlock, readClipboard, toHtmlTable, toTsv } from '@/lib/sheet/clipboard'
import { plainNumber } from '@/lib/sheet/format'
import { placeBlock } from '@/lib/sheet/paste'
import type { Lines, Selection } from '@/lib/sheet/selection'
import { type BookView, bookView } from './book-view'
import { readCell } from './cell-reading'
import type { Desk, Offer } from './desk'
import { readRow } from './rows'
import { tableCell } from './table-cells'
import { isAbsentThere, readTyped, setStreamField } from './table-edits'

/** What a cell puts on the clipboard: numbers in full, in the row's unit; what is unknown or absent is empty. */
function copyText(view: BookView, place: GridPlace): string {
  const ref = readRow(place.row)
  if (ref?.kind !== 'value' || place.column === NAME_COLUMN || place.column === UNIT_COLUMN)
    return tableCell(view, place).text
  const reading = readCell(view, place.column, ref)
  if (reading.state === 'wrong') return reading.given?.text ?? ''
  return reading.value === null ? '' : plainNumber(reading.value, view.decimal)
}

export function copyBlock(view: BookView, range: GridRange): { text: string; html: string } {
  const rows = range.rows.map((row) => range.columns.map((column) => copyText(view, { row, column })))
  return { text: toTsv(rows), html: toHtmlTable(rows, view.decimal) }
}

export const readBlock = (data: { text: string; html: string }): ClipboardBlock => readClipboard(data, new DOMParser())

type Pasting = { view: BookView; desk: Desk; lines: Lines; selection: Selection; block: ClipboardBlock }

/** Pastes a block into the stream table as one change; asks before it adds streams or lets components be present. */
export function pasteBlock({ view, desk, lines, selection, block }: Pasting): void {
  const placed = placeBlock(lines, selection, block.rows)
  const missing = placed.missing.columns
  const ask = (text: string, ways: Offer['ways']) => desk.offer({ pane: 'table', place: selection.active, text, ways })
  const paste = (add: number) => {
    const tries = pasteEdit(view, lines, selection, block, { add, letIn: false })
    if (tries.absent === 0) return void desk.tryRun(tries.edit())
    ask(`${counted(tries.absent, 'value')} of the block would stand where the component cannot be in the stream.`, [
      {
        label: 'Let them be present and paste',
        act: () => desk.tryRun(pasteEdit(view, lines, selection, block, { add, letIn: true }).edit()),
      },
      { label: 'Paste the rest', act: () => desk.tryRun(tries.edit()) },
    ])
  }
  if (missing === 0) paste(0)
  else
    ask(`The block is wider than the table by ${counted(missing, 'column')}.`, [
      { label: `Add ${counted(missing, 'stream')} and paste`, act: () => paste(missing) },
      { label: 'Paste what fits', act: () => paste(0) },
    ])
}

/** The edit, and how many values stand in the way of an absence. Values that may not be present are then left out. */
function pasteEdit(
  view: BookView,
  lines: Lines,
  selection: Selection,
  block: ClipboardBlock,
  { add, letIn }: { add: number; letIn: boolean },
): { absent: number; edit: () => Edit } {
  const { state } = view
  const cellsIn = (current: BookState, inLines: Lines) => {
    const inView = bookView(current, view.caseId, view.solved, view.mayEdit, view.decimal, view.digits)
    const placed = placeBlock(inLines, selection, block.rows)
    const givens = placed.cells.flatMap((cell) => readTyped(inView, cell, cell.text, block.decimal) ?? [])
    const fields = placed.cells.filter(({ row, column }) => readRow(row)?.kind === 'field' && !isHead(column))
    return { givens, fields }
  }
  const absent = cellsIn(state, lines).givens.filter((cell) => isAbsentThere(state, cell)).length
  const edit = () =>
    together(
      state,
      newId,
      `Paste ${block.rows.length} × ${Math.max(0, ...block.rows.map((row) => row.length))} cells`,
      [
        (current) => addStreams(current, { items: Array.from({ length: add }, () => ({})) }, newId),
        (current) => {
          const inLines = { ...lines, columns: withNew(lines.columns, current) }
          const { givens, fields } = cellsIn(current, inLines)
          const stuck = givens.filter((cell) => isAbsentThere(current, cell))
          const kept = letIn ? givens : givens.filter((cell) => !isAbsentThere(current, cell))
          return together(current, newId, 'Paste', [
            ...fields.map(({ row, column, text }) => (now: BookState) => {
              const ref = readRow(row)
              if (ref?.kind !== 'field') throw new Error(`Row ${row} is no field`)
              return setStreamField(now, column, ref.field, text, block.decimal ?? view.decimal)
            }),
            ...(letIn
              ? stuck.map(
                  ({ streamId, componentId }) =>
                    (now: BookState) =>
                      setPresence(now, [streamId], componentId === null ? [] : [componentId], 'present', newId),
                )
              : []),
            (now) => setGivens(now, kept, newId),
          ])
        },
      ],
    )
  return { absent, edit }
}

const isHead = (column: string): boolean => column === NAME_COLUMN || column === UNIT_COLUMN

function withNew(columns: readonly string[], state: BookState): string[] {
  const known = new Set(columns)
  return [...columns, ...inOrder(state.stream).flatMap(({ id }) => (known.has(id) ? [] : [id]))]
}
