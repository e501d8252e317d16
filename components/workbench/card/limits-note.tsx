'use client'

import { usePanels } from '@/hooks/use-panels'
import type { Bound, Limits, NoLimits, Place } from '@/lib/balance'
import type { RecordOf } from '@/lib/book/kinds'
import { measureName } from '@/lib/book/measures'
import { formatNumber } from '@/lib/sheet/format'
import { type BookView, measureOfRow, rowScale, rowStyle, rowUnit } from '../book-view'
import { quantityOf, type RowPlace } from '../rows'
import { CardSection } from './card-parts'

type LimitsNoteProps = { view: BookView; stream: RecordOf<'stream'>; row: RowPlace }

/** The least and greatest value that an unknown cell can have, in the unit of its row. */
export function LimitsNote({ view, stream, row }: LimitsNoteProps) {
  const place = placeOfCell(view, stream, row)
  const { answer, stale, trouble } = usePanels('limits', place && { place })
  if (!place) return null
  const lines = trouble
    ? [`No limits. ${trouble}`]
    : answer && !stale
      ? limitsWords(view, row, answer)
      : ['Working out …']
  if (lines.length === 0) return null
  return (
    <CardSection title="Limits">
      <div className="grid gap-1 text-sm">
        {lines.map((line) => (
          <p key={line}>{line}</p>
        ))}
      </div>
    </CardSection>
  )
}

/** As the solver names the cell: by tags. null where a record it hangs on is gone. */
function placeOfCell(view: BookView, stream: RecordOf<'stream'>, row: RowPlace): Place | null {
  const at = { stream: stream.tag.trim() }
  if (row.quantity === 'measure') {
    const measure = measureOfRow(view, row)
    const name = measure && measureName(view.state, measure)
    return name === undefined || typeof name === 'string' ? null : { ...at, ...name }
  }
  const quantity = quantityOf(row.quantity, view.book.basis)
  if (row.componentId === null) return { ...at, quantity }
  const component = view.state.component.get(row.componentId)
  return component ? { ...at, quantity, component: component.tag.trim() } : null
}

const whyNone: Record<NoLimits, string> = {
  noCell: '',
  atOdds: 'No limits while values joined to it are at odds.',
  negativeFlow:
    'No limits: with what is given some flow is negative, whatever this is. A given or a connection is wrong.',
  tooLarge: 'No limits: too much is still unknown to work them out.',
  failed: 'No limits: they could not be worked out.',
}

/** What a person reads of the limits: "Between 0 and 100 kg/h." */
export function limitsWords(view: BookView, row: RowPlace, limits: Limits): string[] {
  if (!limits.found) return whyNone[limits.why] === '' ? [] : [whyNone[limits.why]]
  const { least, greatest, atLeastAsWide } = limits
  const unit = rowUnit(view, row).shown
  const say = (value: number): string =>
    formatNumber(value * rowScale(view, row), rowStyle(view, row), { decimal: view.decimal, extraDigits: 1 })
  const shown = ({ value, isReached }: Bound): string =>
    value === null ? '' : `${say(value)}${isReached ? '' : ' (approached, not reached)'}`
  const [low, high] = [shown(least), shown(greatest)]
  const range =
    low !== '' && low === high
      ? `${low} ${unit}: the only value with no flow negative.`
      : low === ''
        ? high === ''
          ? 'Any value at all.'
          : `At most ${high} ${unit}; no lower limit.`
        : high === ''
          ? `At least ${low} ${unit}; no upper limit.`
          : `Between ${low} and ${high} ${unit}.`
  return [
    range,
    atLeastAsWide
      ? 'Rules that multiply unknowns are left out: these limits are at least as wide as the true ones.'
      : 'With everything given kept and no flow negative.',
  ]
}
