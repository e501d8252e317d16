import type { Given } from '../problem'
import type { Place } from '../solution'

/** Where a given stands. */
export const placeOf = ({ stream, quantity, component, instrument }: Given): Place => ({
  stream,
  quantity,
  ...(component !== undefined && { component }),
  ...(instrument !== undefined && { instrument }),
})

/** Orders places by what they are called, so that nothing depends on the order of typing. */
export const placeKey = ({ stream, quantity, component = '', instrument = '' }: Place): string =>
  [stream, quantity, component, instrument].join('\u0000')
