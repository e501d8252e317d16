import type { Problem } from '@/lib/balance/problem'
import type { RecordOf } from '@/lib/book/kinds'
import { measureTitle } from '@/lib/book/measures'
import type { LeftOut } from '@/lib/book/problem-draft'
import { type BookState, bookOf, inOrder } from '@/lib/book/state'

type Given = RecordOf<'given'>

/** One typed value with where it comes from. Texts are word for word; numbers are in `unit`. */
export type GivenLine = {
  stream: string
  measure: string
  component: string
  instrument: string
  text: string
  value: number | null
  unit: string
  halfWidth: number | null
  sigma: number | null
  use: string
  sourceKind: string
  source: string
  note: string
  /** Why the solver did not get it; empty where it did. */
  remark: string
}

export const quantityWords: { readonly [Q in Given['quantity']]: string } = {
  flow: 'total flow',
  componentFlow: 'component flow',
  massFlow: 'mass flow',
  moleFlow: 'mole flow',
  componentMassFlow: 'component mass flow',
  componentMoleFlow: 'component mole flow',
  volumeFlow: 'volume flow',
  massFraction: 'mass fraction',
  moleFraction: 'mole fraction',
  dryMassFraction: 'dry mass fraction',
  dryMoleFraction: 'dry mole fraction',
  elementMassFraction: 'element mass fraction',
  groupMassRatio: 'mass ratio',
  groupMoleRatio: 'mole ratio',
}

const useWords = { given: 'given', check: 'check only', withdrawn: 'withdrawn' } as const
const sourceWords = {
  design: 'design',
  meter: 'meter',
  laboratory: 'laboratory',
  assumption: 'assumption',
  difference: 'by difference',
} as const

/** Every given of a case, stream by stream, totals before components: those not used and not readable too. */
export function givensOf(
  state: BookState,
  caseId: string,
  leftOut: readonly LeftOut[],
  unitsOf: DefaultUnits,
): GivenLine[] {
  const streams = inOrder(state.stream)
  const components = inOrder(state.component)
  const streamAt = new Map(streams.map(({ id }, index) => [id as string, index]))
  const componentAt = new Map(components.map(({ id }, index) => [id as string, index]))
  const rowAt = new Map(inOrder(state.measure).map((measure, index) => [measure.id as string, { measure, index }]))
  const whyLeftOut = new Map(leftOut.filter(({ kind }) => kind === 'given').map(({ id, what }) => [id, what]))
  const order = (given: Given): [number, number, number] => [
    streamAt.get(given.streamId) ?? -1,
    Object.keys(quantityWords).indexOf(given.quantity),
    componentAt.get(given.componentId ?? '') ?? rowAt.get(given.measureId ?? '')?.index ?? -1,
  ]
  const titleOf = (given: Given): string | undefined => {
    const row = rowAt.get(given.measureId ?? '')
    return row && measureTitle(state, row.measure)
  }
  return [...state.given.values()]
    .filter((given) => given.caseId === caseId)
    .map((given) => ({ given, at: order(given) }))
    .sort((a, b) => a.at[0] - b.at[0] || a.at[1] - b.at[1] || a.at[2] - b.at[2] || (a.given.id < b.given.id ? -1 : 1))
    .map(({ given, at: [stream] }) => ({
      stream: streams[stream]?.tag ?? '',
      measure: quantityWords[given.quantity],
      component: titleOf(given) ?? state.component.get(given.componentId ?? '')?.tag ?? '',
      instrument: given.instrument === 'main' ? '' : given.instrument,
      text: given.text,
      value: given.value,
      unit: given.unit ?? unitsOf(given.quantity),
      halfWidth: given.halfWidth,
      sigma: given.sigma,
      use: useWords[given.use],
      sourceKind: given.sourceKind === null ? '' : sourceWords[given.sourceKind],
      source: given.source ?? '',
      note: given.note ?? '',
      remark: whyLeftOut.get(given.id) ?? '',
    }))
}

/** The unit that a quantity is in where none is typed. */
export type DefaultUnits = (quantity: Given['quantity']) => string

export function defaultUnits(
  units: { mass: string; mole: string; volume: string },
  basis: Problem['basis'],
): DefaultUnits {
  return (quantity) => {
    switch (quantity) {
      case 'flow':
      case 'componentFlow':
        return units[basis]
      case 'massFlow':
      case 'componentMassFlow':
        return units.mass
      case 'moleFlow':
      case 'componentMoleFlow':
        return units.mole
      case 'volumeFlow':
        return units.volume
      default:
        return 'of 1'
    }
  }
}

/** What the table leans on that nobody measured or fixed: numbered in the notes of the export. */
export function assumptionsOf(state: BookState, givens: readonly GivenLine[]): string[] {
  const { flowUnit } = bookOf(state)
  return givens
    .filter(({ sourceKind, use }) => sourceKind === 'assumption' && use !== 'withdrawn')
    .map(({ stream, measure, component, text, unit, note, source }) => {
      const what = `Stream ${stream}, ${measure}${component ? ` of ${component}` : ''}: ${text}`
      const told = /[a-z%]/i.test(text) || unit === 'of 1' ? what : `${what} ${unit || flowUnit}`
      return [told, source, note].filter((part) => part !== '').join('. ')
    })
}
