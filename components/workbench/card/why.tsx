'use client'

import { CellState } from '@/lib/balance/solution'
import type { RecordOf } from '@/lib/book/kinds'
import type { BookView } from '../book-view'
import type { Reading } from '../cell-reading'
import type { Desk } from '../desk'
import { shortBy } from '../reasons/boundary-words'
import type { Explained } from '../reasons/explained'
import type { Reasons } from '../reasons/reasons'
import { stepEquations } from '../reasons/step-equations'
import { LeansOn } from '../reasons/step-sheet'
import { stepTitle, stepWhy } from '../reasons/step-words'
import { CardSection } from './card-parts'

type WhyProps = { view: BookView; desk: Desk; stream: RecordOf<'stream'>; reading: Reading; reasons: Reasons }

/** More equations than this are read in the workings. */
const SHOWN = 8
/** So many boundaries of an unknown are named, the one that lacks least first. */
const NAMED = 4

/** Why a cell has its value: the step, its boundary and equations; of an unknown, which boundaries are short. */
export function Why({ view, desk, stream, reading, reasons }: WhyProps) {
  const { explained } = reasons.handle
  const solution = view.solved?.solution
  // Workings of a book of another size know this cell under another number.
  if (!explained || !solution || reading.slot === null) return null
  if (explained.solved.solution.states.length !== solution.states.length) return null
  // What a clash holds back is told by the notes of the cell.
  if (solution.blockedBy.some(([slot]) => slot === reading.slot)) return null
  if (reading.state === 'unknown') return <Short stream={stream} explained={explained} desk={desk} reasons={reasons} />
  const number = explained.explanation.stepOfSlot[reading.slot] ?? 0
  const step = explained.explanation.workings[number - 1]
  if (reading.state !== 'solvable' || !step || explained.solved.solution.states[reading.slot] !== CellState.solvable)
    return null
  const { lines, leansOn } = stepEquations(view, explained, step)
  return (
    <CardSection title="Why">
      <p className="font-semibold">{stepTitle(step)}</p>
      <p className="text-sm">{stepWhy(explained, step)}</p>
      {lines.length > 0 ? (
        <ul className="mt-1.5 text-xs" aria-label="Equations">
          {lines.slice(0, SHOWN).map(({ key, name, numbers }) => (
            <li key={key} className="border-t border-hair py-1">
              <span className="text-ink-2">{name}</span>{' '}
              <span className="font-mono tracking-tight [overflow-wrap:anywhere]">{numbers}</span>
            </li>
          ))}
        </ul>
      ) : null}
      {lines.length > SHOWN ? (
        <p className="text-2xs text-ink-2">And {lines.length - SHOWN} more in the workings.</p>
      ) : null}
      <LeansOn list={leansOn} desk={desk} />
      <button type="button" className="link mt-1.5 text-sm" onClick={() => reasons.openStep(step.step)}>
        Step {step.step} of {explained.explanation.workings.length} in the workings
      </button>
    </CardSection>
  )
}

type ShortProps = { stream: RecordOf<'stream'>; explained: Explained; desk: Desk; reasons: Reasons }

/** The boundaries that the stream crosses, and how many values each still lacks. */
function Short({ stream, explained, desk, reasons }: ShortProps) {
  const { problem, explanation } = explained
  const all = explanation.boundaries
    .filter(({ crossing, status }) => crossing.includes(stream.tag.trim()) && status !== 'done')
    .sort((a, b) => shortBy(a) - shortBy(b) || a.units.length - b.units.length)
  if (all.length === 0)
    return (
      <CardSection title="Why">
        <p className="text-sm">No boundary is crossed by this stream: connect it to a unit, or type what is known.</p>
      </CardSection>
    )
  return (
    <CardSection title="Why">
      <p className="text-sm">Nothing fixes it yet. The boundaries that this stream crosses, as typed:</p>
      <ul className="mt-1 text-sm" aria-label="Boundaries of this stream">
        {all.slice(0, NAMED).map((boundary) => {
          const { units, unknowns, independent } = boundary
          const lacks = shortBy(boundary)
          return (
            <li key={units.join('\n')} className="border-t border-hair py-1">
              <button
                type="button"
                className="link text-start"
                onClick={() => {
                  reasons.onMark(boundary)
                  desk.openPanel('boundaries')
                }}
              >
                {units.length === problem.units.length && units.length > 1 ? 'Whole process' : units.join(', ')}
              </button>{' '}
              {lacks === 0
                ? `has enough equations: ${unknowns} unknown, ${independent} independent equations; what they fix is elsewhere in it.`
                : `is short by ${lacks}: ${unknowns} unknown, ${independent} independent ${independent === 1 ? 'equation' : 'equations'}.`}
            </li>
          )
        })}
      </ul>
    </CardSection>
  )
}
