import { measureKey } from '@/lib/balance/measure/measure-name'
import type { Use } from '@/lib/balance/workings/step'
import { bookUnitOf } from '@/lib/book/units'
import { formatNumber } from '@/lib/sheet/format'
import type { BookView } from '../book-view'
import { placeWords } from '../words'
import type { Explained } from './explained'
import type { Term } from './step-terms'

/** Flows and fractions go into the other equations by their numbers; what else was typed is an equation of its own. */
export const countsApart = ({ quantity }: Use): boolean =>
  quantity !== 'flow' && quantity !== 'componentFlow' && quantity !== 'massFraction' && quantity !== 'moleFraction'

/** A typed value by name and as it was typed. */
export function typedTerm(view: BookView, { problem }: Explained, use: Use): Term | null {
  const { stream, quantity } = use
  if (stream === undefined || quantity === undefined) return null
  const place = { ...use, stream, quantity }
  const given = problem.givens?.find(
    (one) => one.stream === stream && (one.use ?? 'given') === 'given' && measureKey(one) === measureKey(place),
  )
  if (!given) return null
  const name = placeWords(view, place)
  const unit = given.unit ?? bookUnitOf(quantity, problem.basis, problem.flowUnit) ?? ''
  const value = formatNumber(given.value, unit === '%' ? 'percent' : 'flow', {
    decimal: view.decimal,
    typed: true,
    halfWidth: given.halfWidth ?? null,
  })
  return { symbols: name, numbers: `${name} = ${value} ${unit === '1' ? '' : unit}`.trimEnd() }
}
