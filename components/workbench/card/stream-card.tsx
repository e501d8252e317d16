'use client'

import { Button } from '@/components/ui/button'
import { isOutOfReach, type Reach, setOutOfReach } from '@/lib/book/cannot-measure'
import { setFields } from '@/lib/book/edits/fields'
import { absenceId, newId } from '@/lib/book/ids'
import type { RecordOf } from '@/lib/book/kinds'
import { plainNumber } from '@/lib/sheet/format'
import type { BookView } from '../book-view'
import { CommitInput } from '../commit-input'
import type { Desk } from '../desk'
import { FractionChoice } from '../odds/fraction-choice'
import { setStreamField } from '../table-edits'
import { CardHead, CardSection } from './card-parts'

type Stream = RecordOf<'stream'>

/** A whole stream: name, phase, density, what to do with its fractions, and which components can be in it. */
export function StreamCard({ view, desk, stream }: { view: BookView; desk: Desk; stream: Stream }) {
  const { state, mayEdit } = view
  const troubles = view.streamTroubles.get(stream.id) ?? []
  const field = (name: 'name' | 'phase' | 'density' | 'temperature' | 'pressure') => (text: string) =>
    desk.run(setStreamField(state, stream.id, name, text, view.decimal))
  const present = view.components.filter(({ id }) => !state.absence.has(absenceId(stream.id, id)))
  return (
    <>
      <CardHead where="Stream" title={stream.tag} />
      {troubles.map(({ text }) => (
        <p key={text} className="mt-2 rounded-control bg-odds px-3 py-2 text-sm">
          {text}
        </p>
      ))}
      <fieldset disabled={!mayEdit} className="contents">
        <div className="mt-3 grid gap-2.5">
          <CommitInput label="Name" value={stream.name} onCommit={field('name')} />
          <div className="grid grid-cols-2 gap-2.5">
            <CommitInput label="Phase" value={stream.phase ?? ''} onCommit={field('phase')} />
            <CommitInput
              label="Density, kg/m³"
              inputMode="decimal"
              value={stream.density === null ? '' : plainNumber(stream.density, view.decimal)}
              onCommit={field('density')}
            />
            <CommitInput label="Temperature" value={stream.temperature ?? ''} onCommit={field('temperature')} />
            <CommitInput label="Pressure" value={stream.pressure ?? ''} onCommit={field('pressure')} />
          </div>
          <p className="text-sm text-ink-3">
            Temperature and pressure are carried as notes; nothing is calculated from them.
          </p>
          <FractionChoice view={view} desk={desk} stream={stream} />
          <OutOfReach view={view} desk={desk} stream={stream} />
          <CommitInput
            label="Note"
            lines
            value={stream.note ?? ''}
            onCommit={(text) => desk.run(setFields(state, 'stream', stream.id, { note: text.trim() || null }, newId))}
          />
        </div>
        <CardSection title="Components that can be in it">
          <p>{present.length === 0 ? 'None' : present.map(({ tag }) => tag).join(', ')}</p>
          {mayEdit ? (
            <Button
              size="small"
              className="mt-2"
              onClick={() => desk.openDialog({ kind: 'presence', streamId: stream.id })}
            >
              Choose components…
            </Button>
          ) : null}
        </CardSection>
      </fieldset>
    </>
  )
}

const reaches: [Reach, string][] = [
  ['flow', 'Flow cannot be measured'],
  ['analysis', 'Cannot be analysed'],
]

/** What is not asked for when the next value to measure is looked for. */
function OutOfReach({ view, desk, stream }: { view: BookView; desk: Desk; stream: Stream }) {
  return (
    <div className="grid gap-1.5">
      {reaches.map(([reach, label]) => (
        <label key={reach} className="flex items-center gap-2">
          <input
            type="checkbox"
            className="size-4 accent-(--brook)"
            checked={isOutOfReach(stream, reach)}
            onChange={(event) => desk.tryRun(setOutOfReach(view.state, stream.id, reach, event.target.checked, newId))}
          />
          {label}
        </label>
      ))}
    </div>
  )
}
