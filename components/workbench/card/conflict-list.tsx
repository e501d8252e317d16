'use client'

import type { Conflict } from '@/lib/balance/solution'
import type { RecordOf } from '@/lib/book/kinds'
import { bookUnitOf, convert } from '@/lib/book/units'
import { formatNumber } from '@/lib/sheet/format'
import { type BookView, isFraction, rowUnit } from '../book-view'
import { type RowQuantity, rowQuantityOf } from '../rows'
import { placeWords, sentence } from '../words'
import { CardSection } from './card-parts'

/** More at once cannot be read; settling one usually settles others. */
const SHOWN = 2

type ConflictListProps = {
  view: BookView
  stream: RecordOf<'stream'>
  quantity: RowQuantity
  component: RecordOf<'component'> | undefined
}

/** The clashes that a cell takes part in, with what the others imply and by how much it differs. */
export function ConflictList({ view, stream, quantity, component }: ConflictListProps) {
  const conflicts = (view.solved?.solution.conflicts ?? []).filter((conflict) =>
    conflict.givens.some(
      (place) =>
        place.stream === stream.tag.trim() &&
        rowQuantityOf(place.quantity, view.book.basis) === quantity &&
        place.component === component?.tag.trim(),
    ),
  )
  if (conflicts.length === 0) return null
  return (
    <CardSection title="At odds">
      {conflicts.slice(0, SHOWN).map((conflict) => (
        <div key={conflictKey(conflict)} className="mb-2 border-s-3 border-odds-edge ps-2.5 text-sm">
          <p>{where(conflict)}</p>
          <ul className="mt-1 grid gap-1">
            {conflict.givens.map((place) => (
              <li key={`${place.stream}/${place.quantity}/${place.component ?? ''}/${place.instrument ?? ''}`}>
                {sentence(placeWords(view, place))}: {numbers(view, place)}
              </li>
            ))}
            {conflict.relations.map((rule) => (
              <li key={rule.id}>Rule {rule.id}</li>
            ))}
          </ul>
        </div>
      ))}
      {conflicts.length > SHOWN ? (
        <p className="mb-1 text-sm">It takes part in {conflicts.length - SHOWN} more such sets.</p>
      ) : null}
      <p className="text-sm text-ink-2">Correct one, withdraw it, or keep it as a check only: under “Use” below.</p>
    </CardSection>
  )
}

const conflictKey = (conflict: Conflict): string =>
  JSON.stringify([
    conflict.code,
    conflict.boundary,
    conflict.givens.map(({ stream, quantity, component }) => [stream, quantity, component]),
  ])

function where({ boundary, stream }: Conflict): string {
  if (boundary.length > 0) return `These cannot all hold round ${boundary.join(', ')}:`
  return stream ? `These cannot all hold in stream ${stream}:` : 'These cannot all hold:'
}

/** "typed 24.00, the others imply 23.10 wt %". */
function numbers(view: BookView, place: Conflict['givens'][number]): string {
  const { basis, flowUnit } = view.book
  const cell = rowQuantityOf(place.quantity, basis)
  const from = bookUnitOf(place.quantity, basis, flowUnit) ?? ''
  const { symbol, shown } = rowUnit(view, cell)
  const style = isFraction(cell) ? 'percent' : 'flow'
  const say = (value: number, extraDigits = 0) =>
    formatNumber(convert(value, from, symbol) ?? value, style, { decimal: view.decimal, extraDigits })
  return `typed ${say(place.typed)}, the others imply ${say(place.implied, 1)} ${shown}`
}
