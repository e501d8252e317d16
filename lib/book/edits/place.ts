import { type CaseId, type ComponentId, givenId, type MeasureId, type StreamId } from '../ids'
import type { RecordOf } from '../kinds'
import { measureTitle } from '../measures'
import type { BookState } from '../state'

export type Quantity = RecordOf<'given'>['quantity']

/** Where a given stands. */
export type GivenPlace = {
  caseId: CaseId
  streamId: StreamId
  quantity: Quantity
  componentId: ComponentId | null
  /** The row, for a quantity that a row says the rest of. */
  measureId?: MeasureId | null | undefined
  instrument?: string
}

export const idOfPlace = ({ caseId, streamId, quantity, componentId, measureId, instrument }: GivenPlace): string =>
  givenId(caseId, streamId, quantity, componentId ?? measureId ?? null, instrument)

const ofStream: Partial<Record<Quantity, (component: string) => string>> = {
  flow: () => 'Total flow of',
  massFlow: () => 'Mass flow of',
  moleFlow: () => 'Mole flow of',
  volumeFlow: () => 'Volume flow of',
  componentFlow: (component) => `Flow of ${component} in`,
  componentMassFlow: (component) => `Mass flow of ${component} in`,
  componentMoleFlow: (component) => `Mole flow of ${component} in`,
  massFraction: (component) => `Mass fraction of ${component} in`,
  moleFraction: (component) => `Mole fraction of ${component} in`,
}

/** "Total flow of 101", "Mass fraction of NaCl in 101". */
export function placeName(
  state: BookState,
  { streamId, quantity, componentId, measureId, instrument }: Omit<GivenPlace, 'caseId'>,
): string {
  const component = componentId === null ? '' : (state.component.get(componentId)?.tag ?? 'a removed component')
  const stream = state.stream.get(streamId)?.tag ?? 'a removed stream'
  const by = instrument === undefined || instrument === 'main' ? '' : ` by ${instrument}`
  const measure = measureId == null ? undefined : state.measure.get(measureId)
  const what = ofStream[quantity]?.(component) ?? `${measure ? measureTitle(state, measure) : 'A removed row'} in`
  return `${what} ${stream}${by}`
}
