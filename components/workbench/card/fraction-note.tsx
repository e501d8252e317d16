'use client'

import { absenceId } from '@/lib/book/ids'
import type { RecordOf } from '@/lib/book/kinds'
import { convert } from '@/lib/book/units'
import { formatNumber } from '@/lib/sheet/format'
import { type BookView, cellKey, isFraction, rowUnit } from '../book-view'
import type { Reading } from '../cell-reading'
import type { Desk } from '../desk'
import { FractionChoice } from '../odds/fraction-choice'
import { oddsOf } from '../odds/odds-sets'
import type { RowPlace } from '../rows'
import { CardSection } from './card-parts'

type FractionNoteProps = {
  view: BookView
  desk: Desk
  stream: RecordOf<'stream'>
  row: RowPlace
  reading: Reading
}

/** On the card of a fraction whose stream does not add up, or where the person has already chosen what happens then. */
export function FractionNote({ view, desk, stream, row, reading }: FractionNoteProps) {
  if (!isFraction(row.quantity)) return null
  const off = oddsOf(view).sets.some(({ fractionsOf }) => fractionsOf === stream.id)
  if (!off && stream.fractions === 'asTyped') return null
  const scaled = stream.fractions === 'scale' ? scaledWords(view, stream.id, row, reading) : null
  return (
    <CardSection title={`Fractions of ${stream.tag}`}>
      {scaled ? <p className="mb-2 text-sm">{scaled}</p> : null}
      <FractionChoice view={view} desk={desk} stream={stream} label="Where they do not add up, they" />
    </CardSection>
  )
}

/** "The typed fractions add up to 105.0 %; scaled, this one is 76.19 %." */
function scaledWords(view: BookView, streamId: string, row: RowPlace, reading: Reading): string | null {
  const { symbol } = rowUnit(view, row)
  let sum = 0
  for (const { id } of view.components) {
    if (view.state.absence.has(absenceId(streamId, id))) continue
    const given = view.givensAt.get(cellKey(streamId, { ...row, componentId: id }))?.[0]
    if (!given || given.value === null || given.use !== 'given') return null
    sum += convert(given.value, given.unit ?? '1', symbol) ?? Number.NaN
  }
  if (reading.value === null || !(sum > 0)) return null
  const say = (value: number) => formatNumber(value, 'percent', { decimal: view.decimal, extraDigits: 1 })
  return `The typed fractions add up to ${say(sum)} %; scaled, this one is used as ${say((reading.value * 100) / sum)} %.`
}
