'use client'

import { useState } from 'react'
import { Button } from '@/components/ui/button'
import { clearGivens, setGivens } from '@/lib/book/edits/givens'
import { newId } from '@/lib/book/ids'
import type { RecordOf } from '@/lib/book/kinds'
import { type BookView, cellKey, rowUnit } from '../book-view'
import { CommitInput } from '../commit-input'
import type { Desk } from '../desk'
import { type RowPlace, rowIdOf } from '../rows'
import { readTyped } from '../table-edits'
import { CardSection } from './card-parts'
import { GivenDetails } from './given-details'

type Given = RecordOf<'given'>
type ReadingsListProps = {
  view: BookView
  desk: Desk
  stream: RecordOf<'stream'>
  row: RowPlace
  others: readonly Given[]
}

/** Readings of one measure beside the one that the cell shows, each by its own instrument; and one more. */
export function ReadingsList({ view, desk, stream, row, others }: ReadingsListProps) {
  const [isAdding, setAdding] = useState(false)
  if (!view.mayEdit && others.length === 0) return null
  return (
    <CardSection title="Further readings">
      {others.length > 0 ? (
        <ul className="grid gap-1.5 text-sm">
          {others.map((given) => (
            <OneReading key={given.id} view={view} desk={desk} stream={stream} row={row} given={given} />
          ))}
        </ul>
      ) : null}
      {view.mayEdit && isAdding ? (
        <AddReading view={view} desk={desk} stream={stream} row={row} onDone={() => setAdding(false)} />
      ) : null}
      {view.mayEdit && !isAdding ? (
        <Button size="small" look="quiet" className="-ms-2" onClick={() => setAdding(true)}>
          Add a reading by another instrument
        </Button>
      ) : null}
    </CardSection>
  )
}

const useWords: Record<Given['use'], string> = { given: 'in use', check: 'check only', withdrawn: 'withdrawn' }

const instrumentName = (instrument: string): string => (instrument === 'main' ? 'Main instrument' : instrument)

function OneReading({ view, desk, stream, row, given }: Omit<ReadingsListProps, 'others'> & { given: Given }) {
  const { instrument } = given
  return (
    <li>
      <details>
        <summary>
          {instrumentName(instrument)}: {given.text} · {useWords[given.use]}
        </summary>
        <div className="ms-3 mb-3 border-s border-hair ps-3">
          <CommitInput
            label={`Value by ${instrumentName(instrument).toLowerCase()}`}
            value={given.text}
            disabled={!view.mayEdit}
            onCommit={(text) => desk.run(typeReading(view, stream.id, row, instrument, text))}
          />
          <GivenDetails view={view} desk={desk} given={given} />
          {view.mayEdit ? (
            <Button size="small" className="mt-3" onClick={() => desk.tryRun(clearGivens(view.state, [given], newId))}>
              Remove this reading
            </Button>
          ) : null}
        </div>
      </details>
    </li>
  )
}

function AddReading({ view, desk, stream, row, onDone }: Omit<ReadingsListProps, 'others'> & { onDone: () => void }) {
  const [instrument, setInstrument] = useState('')
  const { shown } = rowUnit(view, row)
  return (
    <div className="mt-2 grid gap-2">
      <CommitInput
        label="Instrument"
        placeholder="Its tag, such as WT-112"
        value={instrument}
        onCommit={(text) => {
          const wrong = wrongInstrument(view, stream.id, row, text)
          if (!wrong) setInstrument(text.trim())
          return wrong
        }}
      />
      <CommitInput
        label={`Reading, ${shown || 'of 1'}`}
        value=""
        onCommit={(text) => {
          if (text.trim() === '') return null
          const wrong = wrongInstrument(view, stream.id, row, instrument)
          if (wrong) return wrong
          const refused = desk.run(typeReading(view, stream.id, row, instrument, text))
          if (!refused) onDone()
          return refused
        }}
      />
      <Button size="small" look="quiet" className="-ms-2 justify-self-start" onClick={onDone}>
        Cancel
      </Button>
    </div>
  )
}

function typeReading(view: BookView, streamId: string, row: RowPlace, instrument: string, text: string) {
  const cell = readTyped(view, { row: rowIdOf(row), column: streamId }, text, undefined, instrument)
  return setGivens(view.state, cell ? [cell] : [], newId)
}

function wrongInstrument(view: BookView, streamId: string, row: RowPlace, text: string): string | null {
  const tag = text.trim()
  if (tag === '') return 'Type the tag of the instrument first: it tells the readings apart.'
  if (tag.length > 40) return 'A tag has at most 40 characters.'
  if (tag.includes('/')) return 'A tag of an instrument has no slash.'
  const taken = (view.givensAt.get(cellKey(streamId, row)) ?? []).some(({ instrument }) => instrument === tag)
  return taken ? `There is already a reading by ${tag} here.` : null
}
