'use client'

import { type KeyboardEvent, useState } from 'react'
import { classNames } from '@/components/ui/class-names'
import { CellState } from '@/lib/balance/solution'
import type { CellKey, RowKind } from './plant'
import type { CellView } from './plant-view'
import { cellName, showNumber, stateClasses, stateWords } from './plant-words'
import type { WrongEntry } from './use-plant'

type PlantCellProps = {
  cellKey: CellKey
  cell: CellView
  /** Order in the wave of cells that one typed value settles; null when it did not just settle. */
  wave: number | null
  wrong: WrongEntry | undefined
  kind: RowKind
  onType: (text: string) => void
  onMove: (columns: number, rows: number) => void
}

const moves: Record<string, [columns: number, rows: number]> = {
  ArrowUp: [0, -1],
  ArrowDown: [0, 1],
  Enter: [0, 1],
}

/** One cell: its number, to be typed over. While it is edited it shows what was typed, then the number as the table writes it. */
export function PlantCell({ cellKey, cell, wave, wrong, kind, onType, onMove }: PlantCellProps) {
  const [draft, setDraft] = useState<string | null>(null)
  const shown = cell.value === null ? '' : showNumber(cell.value, kind, cell.state === CellState.given)
  const text = draft ?? wrong?.text ?? shown
  const isOpen = cell.state === CellState.unknown && text === ''

  const onKeyDown = (event: KeyboardEvent<HTMLInputElement>) => {
    if (event.nativeEvent.isComposing) return
    const input = event.currentTarget
    const atStart = input.selectionStart === 0
    const atEnd = input.selectionEnd === input.value.length
    const move =
      moves[event.key] ??
      (event.key === 'ArrowLeft' && atStart ? [-1, 0] : event.key === 'ArrowRight' && atEnd ? [1, 0] : undefined)
    if (!move) return
    event.preventDefault()
    onMove(move[0] as number, move[1] as number)
  }

  return (
    <td
      className={classNames(
        'relative h-[27px] border-e border-b border-hair p-0 last:border-e-0 focus-within:z-10 focus-within:outline-2 focus-within:-outline-offset-2 focus-within:outline-focus',
        wrong ? 'cell-wrong' : stateClasses[cell.state],
        wave !== null && 'cell-settles',
      )}
      style={wave === null ? undefined : ({ '--wave': wave } as React.CSSProperties)}
    >
      {isOpen ? (
        <span className="pointer-events-none absolute inset-0 grid place-items-center" aria-hidden="true">
          <span className="cell-mark">·</span>
        </span>
      ) : null}
      <input
        id={`cell-${cellKey}`}
        className={classNames(
          'absolute inset-0 w-full bg-transparent ps-1 pe-1 text-end font-mono text-xs tracking-tighter sm:ps-1.5 sm:pe-2 sm:text-sm sm:tracking-tight outline-none',
          kind === 'flow' && 'font-semibold',
        )}
        inputMode="decimal"
        autoComplete="off"
        spellCheck={false}
        aria-label={`${cellName(cellKey)}, ${wrong ? 'not understood' : stateWords[cell.state]}`}
        aria-invalid={wrong ? true : undefined}
        title={wrong?.reason}
        value={text}
        onFocus={(event) => event.currentTarget.select()}
        onChange={(event) => {
          setDraft(event.currentTarget.value)
          onType(event.currentTarget.value)
        }}
        onBlur={() => setDraft(null)}
        onKeyDown={onKeyDown}
      />
    </td>
  )
}
