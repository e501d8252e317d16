'use client'

import { useState } from 'react'
import { Tag, type TagTone } from '@/components/ui/tag'
import type { CountedBoundary } from '@/lib/balance'
import type { BookView } from '../book-view'
import { boundarySentences, boundaryTitle, statusWords } from './boundary-words'
import { ChooseUnits } from './choose-units'
import { type MarkedBoundary, sameBoundary } from './explained'
import type { ExplainedHandle } from './use-explained'
import { Waiting } from './waiting'
import { WideTable } from './wide-table'

type BoundariesPanelProps = {
  view: BookView
  handle: ExplainedHandle
  marked: MarkedBoundary | null
  onMark: (boundary: MarkedBoundary | null) => void
}

const heads: [title: string, abbreviation: string][] = [
  ['Crossing streams', 'streams'],
  ['Unknowns', 'unknowns'],
  ['Balances', 'balances'],
  ['Sums', 'sums'],
  ['Rules', 'rules'],
  ['Degrees of freedom', 'freedom'],
  ['Independent equations', 'independent'],
  ['Redundant equations', 'redundant'],
]

const tones: Record<CountedBoundary['status'], TagTone> = {
  done: 'quiet',
  ready: 'solvable',
  partly: 'solvable',
  short: 'unknown',
}

/** Every single unit, the whole process and the boundaries of the workings, counted; and any other, chosen by hand. */
export function BoundariesPanel({ view, handle, marked, onMark }: BoundariesPanelProps) {
  const [byHand, setByHand] = useState<CountedBoundary | null>(null)
  const { explained } = handle
  if (view.plant.length === 0)
    return <p className="px-4 py-3 text-ink-2">No units yet: a boundary is drawn round units.</p>
  if (!explained) return <Waiting handle={handle} />
  const nUnits = explained.problem.units.length
  const listedOnes = explained.explanation.boundaries
  const extra = byHand && !listedOnes.some((one) => sameBoundary(one, byHand)) ? [byHand] : []
  return (
    <div className="grid gap-3 px-4 py-3">
      <Waiting handle={handle} />
      <p className="max-w-[95ch] text-sm text-ink-2">
        Counted as typed, before anything is worked out. Degrees of freedom are unknowns less balances, sums and rules.
        Choosing a row marks the streams that cross it in the table and in the connections.
      </p>
      <WideTable label="Boundaries, table">
        <table className="w-full min-w-[760px] text-sm" aria-label="Boundaries">
          <thead>
            <tr className="border-b border-hair-2 text-2xs text-ink-2">
              <th scope="col" className="py-1 pe-3 text-start font-normal">
                Boundary round
              </th>
              {heads.map(([title, short]) => (
                <th key={short} scope="col" title={title} className="px-2 py-1 text-end font-normal">
                  {title}
                </th>
              ))}
              <th scope="col" className="py-1 ps-3 text-start font-normal">
                Status
              </th>
            </tr>
          </thead>
          {[...extra, ...listedOnes].map((boundary) => (
            <BoundaryRows
              key={boundary.units.join('\n')}
              boundary={boundary}
              title={boundaryTitle(boundary, nUnits)}
              isMarked={sameBoundary(marked, boundary)}
              onMark={onMark}
            />
          ))}
        </table>
      </WideTable>
      <ChooseUnits
        view={view}
        onCounted={(boundary) => {
          setByHand(boundary)
          onMark(boundary)
        }}
      />
    </div>
  )
}

type BoundaryRowsProps = {
  boundary: CountedBoundary
  title: string
  isMarked: boolean
  onMark: (boundary: MarkedBoundary | null) => void
}

/** The counts of one boundary, and under them why rank and count differ. */
function BoundaryRows({ boundary, title, isMarked, onMark }: BoundaryRowsProps) {
  const { crossing, unknowns, balances, sums, rules, degreesOfFreedom, independent, redundant, status, over } = boundary
  const sentences = boundarySentences(boundary)
  const numbers = [unknowns, balances, sums, rules, degreesOfFreedom, independent, redundant]
  return (
    <tbody className={isMarked ? 'border-b border-hair bg-brook-wash' : 'border-b border-hair'}>
      <tr className="align-baseline">
        <th scope="row" className="py-1 pe-3 text-start">
          <button
            type="button"
            aria-pressed={isMarked}
            className="link text-start font-semibold"
            onClick={() => onMark(isMarked ? null : boundary)}
          >
            {title}
          </button>
          {isMarked ? <span className="ms-2 text-2xs text-brook">▾ marked</span> : null}
        </th>
        <td className="px-2 py-1 text-end">{crossing.join(' ')}</td>
        {numbers.map((number, index) => (
          <td key={heads[index + 1]?.[1]} className="px-2 py-1 text-end font-mono">
            {String(number).replace('-', '−')}
          </td>
        ))}
        <td className="py-1 ps-3">
          {over ? <Tag tone="atOdds">At odds</Tag> : <Tag tone={tones[status]}>{capital(statusWords[status])}</Tag>}
        </td>
      </tr>
      {sentences.length > 0 ? (
        <tr>
          <td colSpan={10} className="pb-1.5 text-2xs text-ink-2">
            {sentences.join(' ')}
          </td>
        </tr>
      ) : null}
    </tbody>
  )
}

const capital = (text: string): string => `${text.charAt(0).toUpperCase()}${text.slice(1)}`
