'use client'

import type { Step } from '@/lib/balance/workings/step'
import type { BookView } from '../book-view'
import type { Desk } from '../desk'
import type { Explained } from './explained'
import { type EquationLine, stepEquations } from './step-equations'
import type { LeanedOn } from './step-terms'
import { stepFinds, stepTitle, stepWhy } from './step-words'

type StepSheetProps = { view: BookView; explained: Explained; step: Step; desk: Desk | null }

/** One step of the calculation sheet: the boundary, why it can be worked, the equations with numbers, the results. */
export function StepSheet({ view, explained, step, desk }: StepSheetProps) {
  const { lines, leansOn } = stepEquations(view, explained, step)
  return (
    <>
      <p className="max-w-[95ch]">{stepWhy(explained, step)}</p>
      {lines.length > 0 ? <EquationTable lines={lines} label={`Equations of step ${step.step}`} /> : null}
      <LeansOn list={leansOn} desk={desk} />
      <FindTable view={view} explained={explained} step={step} desk={desk} />
    </>
  )
}

/** Equations in symbols and, under them, with the numbers that were known. */
export function EquationTable({ lines, label }: { lines: readonly EquationLine[]; label: string }) {
  return (
    <div className="mt-1.5">
      <table className="w-full text-sm" aria-label={label}>
        <thead className="sr-only">
          <tr>
            <th scope="col">Equation</th>
            <th scope="col">In symbols, and with numbers</th>
          </tr>
        </thead>
        <tbody>
          {lines.map(({ key, name, symbols, numbers }) => (
            <tr key={key} className="break-inside-avoid border-t border-hair align-top">
              <th
                scope="row"
                className="w-36 py-1 pe-3 text-start font-normal text-ink-2 max-sm:w-24 sm:whitespace-nowrap"
              >
                {name}
              </th>
              <td className="py-1 font-mono tracking-tight [overflow-wrap:anywhere]">
                {symbols === numbers ? null : <span className="block text-2xs text-ink-2">{symbols}</span>}
                <span>{numbers}</span>
              </td>
            </tr>
          ))}
        </tbody>
      </table>
    </div>
  )
}

/** What the equations take their numbers from, each with a way to its cell. */
export function LeansOn({
  list,
  desk,
  title = 'Leans on',
}: {
  list: readonly LeanedOn[]
  desk: Desk | null
  title?: string
}) {
  if (list.length === 0) return null
  return (
    <p className="mt-1.5 text-sm text-ink-2">
      {title}:{' '}
      {list.map(({ key, name, place, value, unit, step }, index) => (
        <span key={key}>
          {index > 0 ? '; ' : ''}
          <CellLink desk={desk} place={place} name={name} /> {value} {unit} ({step === 0 ? 'given' : `step ${step}`})
        </span>
      ))}
    </p>
  )
}

export function CellLink({ desk, place, name }: { desk: Desk | null; place: LeanedOn['place']; name: string }) {
  if (!place || !desk) return <>{name}</>
  return (
    <button type="button" className="link text-start" onClick={() => desk.show('table', place)}>
      {name}
    </button>
  )
}

function FindTable({ view, explained, step, desk }: StepSheetProps) {
  return (
    <div className="mt-2">
      <table className="text-sm" aria-label={`Results of step ${step.step}`}>
        <thead className="sr-only">
          <tr>
            <th scope="col">Stream</th>
            <th scope="col">Result</th>
            <th scope="col">Values</th>
          </tr>
        </thead>
        <tbody>
          {stepFinds(view, explained, step).map(({ key, where, what, unit, values }) => (
            <tr key={key} className="break-inside-avoid border-t border-hair align-baseline">
              <th scope="row" className="py-0.5 pe-3 text-start font-semibold">
                {where}
              </th>
              <td className="py-0.5 pe-3 text-ink-2 sm:whitespace-nowrap">
                {what}
                {unit ? `, ${unit}` : ''}
              </td>
              <td className="py-0.5">
                <span className="flex flex-wrap gap-x-4">
                  {values.map(({ key: of, name, text, place }) => (
                    <span key={of} className="whitespace-nowrap">
                      {name === null ? null : (
                        <span className="text-ink-2">
                          <CellLink desk={desk} place={place} name={name} />{' '}
                        </span>
                      )}
                      <span className="font-mono tracking-tight">{text}</span>
                    </span>
                  ))}
                </span>
              </td>
            </tr>
          ))}
        </tbody>
      </table>
    </div>
  )
}

export const stepHeading = (step: Step): string => `Step ${step.step}: ${stepTitle(step)}`
