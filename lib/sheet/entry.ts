import {
  type AmountKind,
  type FlowUnit,
  flowUnitSymbols,
  fractionUnitSymbols,
  parseFlowUnit,
  parseFractionUnit,
} from '@/lib/balance/measure/units-of-measure'
import type { TypedGiven } from '@/lib/book/edits/givens'
import type { Quantity } from '@/lib/book/edits/place'
import { type DecimalSign, readNumber } from './read-number'

/** What a row of the stream table takes. */
export type EntryMeasure = 'massFlow' | 'moleFlow' | 'volumeFlow' | 'massFraction' | 'moleFraction'

export type EntryContext = {
  measure: EntryMeasure
  /** Shown in the row, and meant where none is typed. */
  unit: string
  decimal: DecimalSign
}

export type Entry =
  | { ok: true; clear: true }
  /** `value` and `halfWidth` are in `unit`; `text` is what was typed, word for word. */
  | { ok: true; clear: false; text: string; value: number; unit: string; halfWidth: number | null }
  | { ok: false; text: string; reason: string }

/** What a row of this quantity takes, in a book of this basis. */
export function entryMeasure(quantity: Quantity, basis: 'mass' | 'mole'): EntryMeasure {
  switch (quantity) {
    case 'flow':
    case 'componentFlow':
      return basis === 'mass' ? 'massFlow' : 'moleFlow'
    case 'componentMassFlow':
      return 'massFlow'
    case 'componentMoleFlow':
      return 'moleFlow'
    case 'dryMassFraction':
    case 'elementMassFraction':
    case 'groupMassRatio':
      return 'massFraction'
    case 'dryMoleFraction':
    case 'groupMoleRatio':
      return 'moleFraction'
    default:
      return quantity
  }
}

/** What `setGiven` takes: null clears, a wrong entry keeps its text. */
export function typedOf(entry: Entry): TypedGiven | null {
  if (!entry.ok) return { text: entry.text, value: null }
  if (entry.clear) return null
  const { text, value, unit, halfWidth } = entry
  return { text, value, unit, halfWidth }
}

/** Reads what was typed into a cell. Never guesses: what is not plain is refused with the reason and what to type. */
export function readEntry(text: string, { measure, unit, decimal }: EntryContext): Entry {
  const typed = text.trim()
  if (typed === '') return { ok: true, clear: true }
  const refuse = (reason: string): Entry => ({ ok: false, text, reason })
  if (typed.startsWith('='))
    return refuse('Cells take values, not formulas. Type the number, or add a rule for a relation between streams.')
  if (/^[<>≤≥]/.test(typed))
    return refuse(
      `“${typed}” is a limit, not a value: the balance needs a number. Leave the cell empty if it is not known.`,
    )
  if (/^[~≈±]/.test(typed)) return refuse('Type the number alone; its uncertainty goes on the cell card.')
  const number = readNumber(typed, decimal)
  if (!number.ok) return refuse(number.reason)
  const { value, halfWidth, rest } = number
  const read = (inUnit: string): Entry => ({ ok: true, clear: false, text, value, unit: inUnit, halfWidth })
  if (/^[±+]/.test(rest)) return refuse('Type the number alone; its uncertainty goes on the cell card.')
  if (rest === '') return read(unit)
  const fitted = measure.endsWith('Fraction')
    ? fitFraction(rest, measure as 'massFraction' | 'moleFraction')
    : fitFlow(rest, measure as FlowMeasure, unit)
  return 'reason' in fitted ? refuse(fitted.reason) : read(fitted.unit)
}

type FlowMeasure = 'massFlow' | 'moleFlow' | 'volumeFlow'
type Fitted = { unit: string } | { reason: string }

const kindOf: Record<FlowMeasure, AmountKind> = { massFlow: 'mass', moleFlow: 'mole', volumeFlow: 'volume' }
const rowNames: Record<EntryMeasure, string> = {
  massFlow: 'mass flow',
  moleFlow: 'mole flow',
  volumeFlow: 'volume flow',
  massFraction: 'mass fraction',
  moleFraction: 'mole fraction',
}

function fitFlow(typed: string, measure: FlowMeasure, rowUnit: string): Fitted {
  const unit = parseFlowUnit(typed)
  const fits = `These fit here: ${examples(measure, rowUnit)}.`
  if (unit) {
    const batch = parseFlowUnit(rowUnit)?.seconds === null
    if (unit.kind !== kindOf[measure])
      return { reason: `${typed} is a unit of ${kindWords(unit)}, and this row is a ${rowNames[measure]}. ${fits}` }
    if (unit.seconds === null && !batch)
      return { reason: `${typed} is an amount, and this row is a flow: type ${typed}/h or the like. ${fits}` }
    if (unit.seconds !== null && batch)
      return { reason: `${typed} is a flow, and this book counts amounts of a batch. ${fits}` }
    return { unit: unit.symbol }
  }
  if (parseFractionUnit(typed))
    return { reason: `${typed} is a unit of a fraction, and this row is a ${rowNames[measure]}. ${fits}` }
  return { reason: `“${typed}” is not a unit known here. ${fits}` }
}

function fitFraction(typed: string, measure: 'massFraction' | 'moleFraction'): Fitted {
  const unit = parseFractionUnit(typed)
  const fits = `These fit here: ${examples(measure)}.`
  if (unit) {
    if (unit.only !== undefined && unit.only !== measure)
      return {
        reason: `${typed} is a ${rowNames[unit.only]}: type it in the ${rowNames[unit.only]} row of this component.`,
      }
    // The row says the basis, so that "wt%" and "%" are one and the same here.
    return { unit: unit.factor === 0.01 ? '%' : unit.symbol }
  }
  const flow = parseFlowUnit(typed)
  if (flow)
    return { reason: `${typed} is a unit of ${kindWords(flow)}, and this row is a ${rowNames[measure]}. ${fits}` }
  return { reason: `“${typed}” is not a unit known here. ${fits}` }
}

const kindWords = ({ kind, seconds }: FlowUnit): string =>
  seconds === null ? `${kind === 'mole' ? 'amount' : kind}` : `${kind} flow`

function examples(measure: EntryMeasure, rowUnit = ''): string {
  if (measure === 'massFraction' || measure === 'moleFraction')
    return fractionUnitSymbols(measure)
      .filter((symbol) => symbol !== '1')
      .slice(0, 8)
      .join(', ')
  const batch = parseFlowUnit(rowUnit)?.seconds === null
  const common = { mass: ['kg', 't', 'g', 'lb'], mole: ['kmol', 'mol', 'lbmol'], volume: ['m3', 'L', 'gal'] }[
    kindOf[measure]
  ]
  const offered = new Set(flowUnitSymbols(kindOf[measure], batch))
  const wanted = common.flatMap((amount) => (batch ? [amount] : [`${amount}/h`, `${amount}/d`]))
  return wanted.filter((symbol) => offered.has(symbol)).join(', ')
}
