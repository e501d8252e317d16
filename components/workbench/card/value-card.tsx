'use client'

import { Button } from '@/components/ui/button'
import { Tag } from '@/components/ui/tag'
import { setGivens } from '@/lib/book/edits/givens'
import { setPresence } from '@/lib/book/edits/presence'
import { newId } from '@/lib/book/ids'
import type { RecordOf } from '@/lib/book/kinds'
import { type BookView, rowUnit, titleOfRow } from '../book-view'
import { keptWords, type Reading, readCell, shownNumber } from '../cell-reading'
import { CommitInput } from '../commit-input'
import type { Desk } from '../desk'
import type { Reasons } from '../reasons/reasons'
import { type RowPlace, rowIdOf } from '../rows'
import { readTyped } from '../table-edits'
import { sentence } from '../words'
import { CardHead, CardSection, StateTag } from './card-parts'
import { CellNotes } from './cell-notes'
import { ConflictList } from './conflict-list'
import { FractionNote } from './fraction-note'
import { GivenDetails } from './given-details'
import { LimitsNote } from './limits-note'
import { NotUsed } from './not-used'
import { otherUnits } from './other-units'
import { ReadingsList } from './readings-list'
import { Why } from './why'

type ValueCardProps = {
  view: BookView
  desk: Desk
  stream: RecordOf<'stream'>
  row: RowPlace
  reasons?: Reasons | undefined
}

/** One cell of the stream table: its value in several units, its state, what was typed and where that comes from. */
export function ValueCard({ view, desk, stream, row, reasons }: ValueCardProps) {
  const { componentId } = row
  const reading = readCell(view, stream.id, row)
  const { shown } = rowUnit(view, row)
  const component = componentId === null ? undefined : view.state.component.get(componentId)
  const title = titleOfRow(view, row)
  const number = shownNumber(view, row, reading, 1)
  const heading = component ? `${component.name || component.tag}, ${title.toLowerCase()}` : title
  return (
    <>
      <CardHead
        where={`${stream.tag} · ${heading}`}
        title={reading.state === 'wrong' ? `“${reading.given?.text}”` : number || noValue(reading)}
        {...(number && reading.state !== 'wrong' ? { unit: shown } : {})}
      />
      <p className="mt-1.5 flex flex-wrap items-center gap-x-2.5 gap-y-1 text-xs text-ink-2">
        <StateTag state={reading.state} />
        {reading.kept ? <Tag>{sentence(keptWords[reading.kept])}</Tag> : null}
        {reading.value === null ? null : otherUnits(view, row, reading.value).join(' · ')}
      </p>
      <CellNotes view={view} desk={desk} stream={stream} row={rowIdOf(row)} reading={reading} />
      <ConflictList view={view} desk={desk} stream={stream} row={row} />
      <FractionNote view={view} desk={desk} stream={stream} row={row} reading={reading} />
      <NotUsed view={view} desk={desk} row={row} reading={reading} />
      {reasons ? <Why view={view} desk={desk} stream={stream} reading={reading} reasons={reasons} /> : null}
      {reading.state === 'unknown' ? <LimitsNote view={view} stream={stream} row={row} /> : null}
      {view.mayEdit && reading.state !== 'absent' ? (
        <CardSection title="Value">
          <CommitInput
            label={reading.given ? 'As typed' : 'Type a value'}
            value={reading.given?.text ?? ''}
            hint={`In ${shown}, or with another unit behind it`}
            onCommit={(text) => {
              const place = { row: rowIdOf(row), column: stream.id }
              const cell = readTyped(view, place, text)
              return cell ? desk.run(setGivens(view.state, [cell], newId)) : null
            }}
          />
        </CardSection>
      ) : null}
      {reading.state === 'absent' && view.mayEdit && componentId !== null ? (
        <Button
          className="mt-4"
          onClick={() => desk.tryRun(setPresence(view.state, [stream.id], [componentId], 'present', newId))}
        >
          Let it be present in {stream.tag}
        </Button>
      ) : null}
      {view.mayEdit && component && reading.state !== 'absent' ? (
        <Button
          size="small"
          look="quiet"
          className="mt-3 -ms-2"
          onClick={() => desk.tryRun(setPresence(view.state, [stream.id], [component.id], 'absent', newId))}
        >
          {component.tag} cannot be in {stream.tag}
        </Button>
      ) : null}
      {reading.given ? <GivenDetails key={reading.given.id} view={view} desk={desk} given={reading.given} /> : null}
      {reading.given ? (
        <ReadingsList view={view} desk={desk} stream={stream} row={row} others={reading.others} />
      ) : null}
    </>
  )
}

function noValue(reading: Reading): string {
  if (reading.state === 'absent') return 'Not in this stream'
  if (reading.state === 'missing') return 'Not available'
  return 'Not known yet'
}
