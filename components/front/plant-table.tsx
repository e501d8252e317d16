'use client'

import { Fragment, useState } from 'react'
import { classNames } from '@/components/ui/class-names'
import { CellState } from '@/lib/balance/solution'
import { type CellKey, cellKey, plant, plantRows } from './plant'
import { PlantCell } from './plant-cell'
import { PlantConnections } from './plant-connections'
import { GroupRow, label } from './plant-group'
import type { PlantView } from './plant-view'
import type { WrongEntry } from './use-plant'

type PlantTableProps = {
  view: PlantView
  wrong: ReadonlyMap<CellKey, WrongEntry>
  onType: (key: CellKey, text: string) => void
}

const groups: Record<string, string> = { 'x-alum': 'Mass fraction', 'n-alum': 'Component flow' }
const head = 'border-e border-b border-hair bg-rail px-1 text-end last:border-e-0 sm:px-2'

const isSolvable = (view: PlantView, key: CellKey) => view.cells[key]?.state === CellState.solvable

/** Cells that were unknown and follow since, in the order of the wave. Further typing lets a wave that runs run out. */
function useSettled(view: PlantView): ReadonlyMap<CellKey, number> {
  const [seen, setSeen] = useState(view)
  const [settled, setSettled] = useState<ReadonlyMap<CellKey, number>>(new Map())
  if (seen !== view) {
    const fresh = (Object.keys(view.cells) as CellKey[]).filter(
      (key) => isSolvable(view, key) && seen.cells[key]?.state === CellState.unknown,
    )
    const before = [...settled].filter(([key]) => isSolvable(view, key))
    setSeen(view)
    setSettled(new Map([...before, ...fresh.map((key, index): [CellKey, number] => [key, index])]))
  }
  return settled
}

export function PlantTable({ view, wrong, onType }: PlantTableProps) {
  const settled = useSettled(view)
  const focusCell = (row: number, column: number) => {
    const next = plantRows[row]
    const stream = plant.streams[column]
    if (!next || !stream) return false
    const input = document.getElementById(`cell-${cellKey(next, stream.id)}`)
    input?.focus()
    return input !== null
  }
  const move = (row: number, column: number, columns: number, rows: number) => {
    let nextRow = row + rows
    let nextColumn = column + columns
    while (plantRows[nextRow] && plant.streams[nextColumn] && !focusCell(nextRow, nextColumn)) {
      nextRow += rows
      nextColumn += columns
    }
  }

  return (
    <table className="w-full table-fixed border-separate border-spacing-0">
      <caption className="sr-only">
        Stream table of an invented alum crystalliser: type a value into any cell, or clear one. Its last rows say which
        stream goes into and comes out of which unit.
      </caption>
      <thead>
        <tr className="h-[30px] font-heading text-base font-semibold">
          <th scope="col" className={classNames(label, 'w-[92px] bg-rail sm:w-[150px]')}>
            Stream
          </th>
          <th scope="col" className={classNames(head, 'hidden w-[66px] sm:table-cell')}>
            <span className="sr-only">Unit</span>
          </th>
          {plant.streams.map((stream) => (
            <th key={stream.id} scope="col" className={head}>
              {stream.id}
            </th>
          ))}
        </tr>
        <tr className="align-top text-2xs leading-[1.2] text-ink-2">
          <td className={classNames(label, 'bg-rail')} />
          <td className={classNames(head, 'hidden sm:table-cell')} />
          {plant.streams.map((stream) => (
            <td key={stream.id} className={classNames(head, 'h-[36px] pt-1')}>
              {stream.name}
            </td>
          ))}
        </tr>
      </thead>
      <tbody>
        {plantRows.map((row, rowIndex) => (
          <Fragment key={row.id}>
            {groups[row.id] ? <GroupRow>{groups[row.id]}</GroupRow> : null}
            <tr className={classNames('text-sm', row.kind === 'flow' && 'h-8 font-semibold')}>
              <th scope="row" className={classNames(label, row.kind === 'flow' ? 'font-semibold' : 'font-normal')}>
                {row.label}{' '}
                <span className="text-2xs font-normal whitespace-nowrap text-ink-3 sm:hidden">{row.unit}</span>
              </th>
              <td className="hidden border-e border-b border-hair px-2 text-xs text-ink-3 sm:table-cell">{row.unit}</td>
              {plant.streams.map((stream, column) => {
                const key = cellKey(row, stream.id)
                const cell = view.cells[key]
                if (!cell || cell.state === CellState.absent)
                  return (
                    <td key={key} className="cell-absent border-e border-b border-hair last:border-e-0">
                      <span aria-hidden="true">–</span>
                      <span className="sr-only">absent</span>
                    </td>
                  )
                return (
                  <PlantCell
                    key={key}
                    cellKey={key}
                    cell={cell}
                    wave={settled.get(key) ?? null}
                    wrong={wrong.get(key)}
                    kind={row.kind}
                    onType={(text) => onType(key, text)}
                    onMove={(columns, rows) => move(rowIndex, column, columns, rows)}
                  />
                )
              })}
            </tr>
          </Fragment>
        ))}
      </tbody>
      <PlantConnections />
    </table>
  )
}
