import type { Given, MeasureName } from '../problem'
import type { Place } from '../solution'

/** The keys that name a measure, without the rest of what carries them. */
export function nameOf({ quantity, component, without, element, parts, over }: MeasureName): MeasureName {
  return {
    quantity,
    ...(component !== undefined && { component }),
    ...(without && { without }),
    ...(element !== undefined && { element }),
    ...(parts && { parts }),
    ...(over && { over }),
  }
}

/** Where a given stands. */
export const placeOf = (given: Given): Place => ({
  stream: given.stream,
  ...nameOf(given),
  ...(given.instrument !== undefined && { instrument: given.instrument }),
})

const sorted = (list: readonly string[] | undefined): string[] | null => (list ? [...list].sort() : null)

/** Equal for two names of one measure: the order within a list does not matter. */
export const measureKey = ({ quantity, component, without, element, parts, over }: Partial<MeasureName>): string =>
  JSON.stringify([quantity ?? null, component ?? null, sorted(without), element ?? null, sorted(parts), sorted(over)])
