'use client'

import { createPortal } from 'react-dom'
import { Caution } from '@/components/ui/caution'
import type { BookView } from '../book-view'
import type { Explained } from './explained'
import { StepSheet, stepHeading } from './step-sheet'
import './print.css'

/** The workings as they go to paper: on the screen nothing, in print the only thing; the head is on every sheet. */
export function WorkingsPrint({ view, explained }: { view: BookView; explained: Explained }) {
  if (typeof document === 'undefined') return null
  const operatingCase = view.state.case.get(view.caseId)
  return createPortal(
    <div className="print-only" aria-hidden="true" inert>
      <table className="print-sheet">
        <thead>
          <tr>
            <th scope="col">
              <div>
                <span>
                  {view.book.name}
                  {operatingCase ? `, ${operatingCase.name}` : ''}: workings
                </span>
                <span>Preliminary</span>
              </div>
            </th>
          </tr>
        </thead>
        <tfoot>
          <tr>
            <td>
              Flows in {view.book.flowUnit}. F(s) is the total flow of stream s, A(s) the flow of A in it and x A(s) its
              fraction of 1; a component flow is fraction times total.
            </td>
          </tr>
        </tfoot>
        <tbody>
          {explained.explanation.workings.map((step) => (
            <tr key={step.step}>
              <td>
                <h2>{stepHeading(step)}</h2>
                <StepSheet view={view} explained={explained} step={step} desk={null} />
              </td>
            </tr>
          ))}
          <tr>
            <td>
              <Caution full />
            </td>
          </tr>
        </tbody>
      </table>
    </div>,
    document.body,
  )
}
