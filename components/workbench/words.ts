import type { Place } from '@/lib/balance/solution'
import { type BookView, rowOfPlace, titleOfRow } from './book-view'
import { rowQuantityOf, rowTitle } from './rows'

/** "total flow of 101", "mass fraction of Sodium chloride in 108"; places of the solver name things by tag. */
export function placeWords(view: BookView, place: Place): string {
  const { basis } = view.book
  const row = rowOfPlace(view, place)
  const title = row?.measureId
    ? titleOfRow(view, row)
    : rowTitle(rowQuantityOf(place.quantity, basis), basis).toLowerCase()
  const by = place.instrument && place.instrument !== 'main' ? ` by ${place.instrument}` : ''
  if (row?.measureId) return `${title} in ${place.stream}${by}`
  if (place.component === undefined) return `${title} of ${place.stream}${by}`
  const component = view.components.find(({ tag }) => tag.trim() === place.component)
  return `${title} of ${component?.name || place.component} in ${place.stream}${by}`
}

/** With a capital first letter, to begin a sentence. */
export const sentence = (text: string): string => `${text[0]?.toUpperCase() ?? ''}${text.slice(1)}`

/** To stand inside a sentence. */
export const lowered = (text: string): string => `${text[0]?.toLowerCase() ?? ''}${text.slice(1)}`
