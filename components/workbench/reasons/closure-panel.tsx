'use client'

import { TriangleAlert } from 'lucide-react'
import { useMemo, useState } from 'react'
import { toProblem } from '@/lib/book/to-problem'
import { plainNumber } from '@/lib/sheet/format'
import type { BookView } from '../book-view'
import { type ClosureRow, closureByUnit, closureRows } from './closure-lines'
import { WideTable } from './wide-table'

type ClosurePanelProps = {
  view: BookView
  /** Per cent; what is further off is marked. */
  limit: number
}

const numberCell = 'px-2 py-1 text-end font-mono whitespace-nowrap'
const head = 'px-2 py-1 text-end font-normal'

/** In minus out: of every unit and the whole, and for the one chosen by component and by element. */
export function ClosurePanel({ view, limit }: ClosurePanelProps) {
  const [chosen, setChosen] = useState<string | null>(null)
  const { state, caseId, solved } = view
  const problem = useMemo(() => toProblem(state, caseId).problem, [state, caseId])
  const solution = solved?.solution
  if (view.plant.length === 0 || problem.units.length === 0)
    return <p className="px-4 py-3 text-ink-2">No units yet: closure is in minus out round units.</p>
  // An answer to another set of streams or components cannot be read with this problem.
  if (!solution || solution.nStreams !== problem.streams.length || solution.nComponents !== problem.components.length)
    return <p className="px-4 py-3 text-ink-2">Working out what follows …</p>
  const lines = closureByUnit(view, problem, solution, limit)
  const shown = lines.find(({ title }) => title === chosen) ?? lines.at(-1)
  const over = lines.filter(({ isOver }) => isOver)
  return (
    <div className="grid gap-4 px-4 py-3">
      <p className="max-w-[95ch] text-sm">
        {over.length === 0
          ? 'No boundary whose flows are known is off by more'
          : `Off by more: ${over.map(({ title }) => title).join(', ')}. The measure is more`}{' '}
        than the limit of {plainNumber(limit, view.decimal)} %.{' '}
        <span className="text-ink-2">
          Left over is in minus out, with what reactions make and what a unit gains taken into account. Closed is not
          the same as correct.
        </span>
      </p>
      <WideTable label="Closure by unit, table">
        <table className="w-full min-w-[560px] text-sm" aria-label="Closure by unit">
          <thead>
            <tr className="border-b border-hair-2 text-2xs text-ink-2">
              <th scope="col" className="py-1 pe-3 text-start font-normal">
                Round
              </th>
              <th scope="col" className={head}>
                In, {problem.flowUnit}
              </th>
              <th scope="col" className={head}>
                Out, {problem.flowUnit}
              </th>
              <th scope="col" className={head}>
                Left over
              </th>
              <th scope="col" className={head}>
                %
              </th>
              <th scope="col" className="py-1 ps-3 text-start font-normal">
                Worst line
              </th>
            </tr>
          </thead>
          <tbody>
            {lines.map(({ title, row, worst, isOver }) => (
              <tr
                key={title}
                className={title === shown?.title ? 'border-b border-hair bg-brook-wash' : 'border-b border-hair'}
              >
                <th scope="row" className="py-1 pe-3 text-start">
                  <button
                    type="button"
                    className="link font-semibold"
                    aria-pressed={title === shown?.title}
                    onClick={() => setChosen(title)}
                  >
                    {title}
                  </button>
                </th>
                <Value text={row.in} />
                <Value text={row.out} />
                <Value text={row.difference} />
                <Value text={row.percent} />
                <td className="py-1 ps-3">
                  {worst ?? <span className="text-ink-2">not all known</span>}{' '}
                  {isOver ? <Over limit={limit} view={view} /> : null}
                </td>
              </tr>
            ))}
          </tbody>
        </table>
      </WideTable>
      {shown ? (
        <Lines
          title={shown.title}
          rows={closureRows(view, problem, solution, shown.units, limit)}
          over={<Over limit={limit} view={view} />}
        />
      ) : null}
    </div>
  )
}

const Value = ({ text }: { text: string | null }) => (
  <td className={numberCell}>{text ?? <span className="font-sans text-2xs text-ink-2">not known</span>}</td>
)

const Over = ({ limit, view }: { limit: number; view: BookView }) => (
  <span className="inline-flex items-center gap-1 rounded-control bg-odds px-1.5 text-2xs text-odds-ink">
    <TriangleAlert className="size-3" aria-hidden="true" /> over {plainNumber(limit, view.decimal)} %
  </span>
)

/** One boundary by component and element; columns that say nothing anywhere are left out. */
function Lines({ title, rows, over }: { title: string; rows: readonly ClosureRow[]; over: React.ReactNode }) {
  const [hasMade, hasHeld] = [rows.some(({ made }) => made !== ''), rows.some(({ held }) => held !== '')]
  const name = title === 'Whole process' ? 'the whole process' : title
  return (
    <WideTable label={`Closure round ${name}, table`}>
      <table className="w-full min-w-[480px] text-sm" aria-label={`Closure round ${name}`}>
        <caption className="pb-1 text-start font-semibold">Round {name}, by component and element</caption>
        <thead>
          <tr className="border-b border-hair-2 text-2xs text-ink-2">
            <th scope="col" className="py-1 pe-3 text-start font-normal">
              Of
            </th>
            <th scope="col" className="px-2 py-1 text-start font-normal">
              Unit
            </th>
            <th scope="col" className={head}>
              In
            </th>
            <th scope="col" className={head}>
              Out
            </th>
            {hasMade ? (
              <th scope="col" className={head}>
                Made
              </th>
            ) : null}
            {hasHeld ? (
              <th scope="col" className={head}>
                Gained
              </th>
            ) : null}
            <th scope="col" className={head}>
              Left over
            </th>
            <th scope="col" className={head}>
              %
            </th>
          </tr>
        </thead>
        <tbody>
          {rows.map((row) => (
            <tr key={row.key} className="border-b border-hair">
              <th scope="row" className="py-1 pe-3 text-start font-normal">
                {row.name} {row.isOver ? over : null}
              </th>
              <td className="px-2 py-1 text-ink-2">{row.unit}</td>
              <Value text={row.in} />
              <Value text={row.out} />
              {hasMade ? <Value text={row.made} /> : null}
              {hasHeld ? <Value text={row.held} /> : null}
              <Value text={row.difference} />
              <Value text={row.percent} />
            </tr>
          ))}
        </tbody>
      </table>
    </WideTable>
  )
}
