'use client'

import { Field } from '@/components/ui/field'
import { Select } from '@/components/ui/select'
import { setGivenDetails } from '@/lib/book/edits/givens'
import { newId } from '@/lib/book/ids'
import { type RecordOf, sourceKinds } from '@/lib/book/kinds'
import { plainNumber } from '@/lib/sheet/format'
import { readNumber } from '@/lib/sheet/read-number'
import type { BookView } from '../book-view'
import { CommitInput } from '../commit-input'
import type { Desk } from '../desk'
import { givenUnit, readWidth, SigmaInput } from '../odds/sigma-input'
import { sentence } from '../words'
import { CardSection } from './card-parts'

type Given = RecordOf<'given'>

const uses: [Given['use'], string][] = [
  ['given', 'Given: the balance uses it'],
  ['check', 'Check only: shown, not used'],
  ['withdrawn', 'Withdrawn'],
]
const kindWords: Record<NonNullable<Given['sourceKind']>, string> = {
  design: 'design',
  meter: 'meter',
  laboratory: 'laboratory',
  assumption: 'assumption',
  difference: 'by difference',
}

/** Where a given comes from, how sure it is, and how it is used. */
export function GivenDetails({ view, desk, given }: { view: BookView; desk: Desk; given: Given }) {
  const { state, mayEdit } = view
  const unit = givenUnit(view, given)
  const set = (details: Parameters<typeof setGivenDetails>[2]) =>
    desk.run(setGivenDetails(state, given.id, details, newId))
  if (!mayEdit)
    return (
      <CardSection title="Where it comes from">
        <p>
          {[given.sourceKind && sentence(kindWords[given.sourceKind]), given.source, given.note]
            .filter(Boolean)
            .join(' · ') || 'Not said'}
        </p>
        <p>
          {given.halfWidth === null
            ? 'Taken as exact'
            : `Rounded to ± ${plainNumber(given.halfWidth, view.decimal)} ${unit}`}
        </p>
        <p>
          {given.sigma === null
            ? 'No uncertainty given'
            : `± ${plainNumber(given.sigma, view.decimal)} ${unit} (one standard deviation)`}
        </p>
        <p>{uses.find(([use]) => use === given.use)?.[1]}</p>
      </CardSection>
    )
  return (
    <>
      <CardSection title="Where it comes from">
        <div className="grid gap-2.5">
          <Field label="Kind of source">
            {(describing) => (
              <Select
                {...describing}
                value={given.sourceKind ?? ''}
                onChange={(event) => set({ sourceKind: (event.target.value || null) as Given['sourceKind'] })}
              >
                <option value="">Not said</option>
                {sourceKinds.map((kind) => (
                  <option key={kind} value={kind}>
                    {sentence(kindWords[kind])}
                  </option>
                ))}
              </Select>
            )}
          </Field>
          <CommitInput
            label="Source"
            placeholder="Instrument, sample or document"
            value={given.source ?? ''}
            onCommit={(text) => set({ source: text.trim() || null })}
          />
          <CommitInput
            label="Note"
            lines
            value={given.note ?? ''}
            onCommit={(text) => set({ note: text.trim() || null })}
          />
        </div>
      </CardSection>
      <CardSection title="How sure, and how used">
        <div className="grid gap-2.5">
          <CommitInput
            label={`Half-width of its rounding, ${unit}`}
            hint={widthHint(view, given, unit)}
            inputMode="decimal"
            value={given.halfWidth === null ? '' : plainNumber(given.halfWidth, view.decimal)}
            onCommit={(text) => {
              const width = readWidth(text, unit, view.decimal, 'half-width')
              return typeof width === 'string' ? width : set({ halfWidth: width })
            }}
          />
          <SigmaInput view={view} desk={desk} given={given} />
          <Field label="Use">
            {(describing) => (
              <Select
                {...describing}
                value={given.use}
                onChange={(event) => set({ use: event.target.value as Given['use'] })}
              >
                {uses.map(([use, words]) => (
                  <option key={use} value={use}>
                    {words}
                  </option>
                ))}
              </Select>
            )}
          </Field>
        </div>
      </CardSection>
    </>
  )
}

/** "Its digits say ± 0.005 %. Left empty, it is taken as exact." */
function widthHint(view: BookView, given: Given, unit: string): string {
  const typed = readNumber(given.text, view.decimal)
  const exact = 'Left empty, the value is taken as exact.'
  if (!typed.ok || typed.halfWidth === null) return exact
  return `Its digits say ± ${plainNumber(typed.halfWidth, view.decimal)} ${unit}. ${exact}`
}
