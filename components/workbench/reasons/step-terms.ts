import type { GridPlace } from '@/hooks/grid-model'
import { quantityOn } from '@/lib/balance/measure/cell-quantity'
import type { Model } from '@/lib/balance/model'
import { type CellQuantity, CellState, slotOf } from '@/lib/balance/solution'
import type { Step } from '@/lib/balance/workings/step'
import { formatNumber } from '@/lib/sheet/format'
import { type BookView, rowOfPlace } from '../book-view'
import { lowered, placeWords } from '../words'
import { type Explained, placeOf, shownAt, unitOf } from './explained'

/** A cell that an equation takes its number from. `step` 0: it was typed. */
export type LeanedOn = {
  key: string
  name: string
  place: GridPlace | null
  value: string
  unit: string
  step: number
}

/** One term of an equation, in symbols and, as far as it was known before the step, in numbers. */
export type Term = { symbols: string; numbers: string }

type Family = { flow: CellQuantity; componentFlow: CellQuantity; fraction: CellQuantity; letter: string }
const own: Family = { flow: 'flow', componentFlow: 'componentFlow', fraction: 'fraction', letter: 'F' }
const other: Family = {
  flow: 'otherFlow',
  componentFlow: 'otherComponentFlow',
  fraction: 'otherFraction',
  letter: 'F′',
}

/** Puts the terms of one step into symbols and numbers, and notes what they lean on. */
export class StepTerms {
  readonly leansOn = new Map<string, LeanedOn>()

  constructor(
    readonly view: BookView,
    readonly explained: Explained,
    readonly model: Model,
    readonly step: Step,
  ) {}

  /** The value of a cell that was typed or found by an earlier step. */
  known(stream: number, quantity: CellQuantity, component = 0): number | undefined {
    const { solved, explanation } = this.explained
    const { states, values, nComponents } = solved.solution
    const slot = slotOf(nComponents, stream, quantity, component)
    const found = explanation.stepOfSlot[slot] ?? 0
    const isTyped = states[slot] === CellState.given || states[slot] === CellState.atOdds
    if (!isTyped && (found === 0 || found >= this.step.step)) return undefined
    const value = values[slot] as number
    if (!Number.isFinite(value)) return undefined
    this.lean(stream, quantity, component, value, isTyped ? 0 : found)
    return value
  }

  private lean(stream: number, quantity: CellQuantity, component: number, value: number, step: number): void {
    const { problem, units } = this.model
    const isTotal = quantity === 'flow' || quantity === 'otherFlow'
    const place = {
      stream: this.streamTag(stream),
      quantity: quantityOn(problem.basis, quantity),
      ...(isTotal ? {} : { component: this.componentTag(component) }),
    }
    const key = `${stream} ${quantity} ${isTotal ? '' : component}`
    const row = rowOfPlace(this.view, place)
    this.leansOn.set(key, {
      key,
      name: lowered(placeWords(this.view, place)),
      place: placeOf(this.view, place),
      value: row ? shownAt(this.view, row, value) : this.number(value),
      unit: row ? unitOf(this.view, row) : units.mass.symbol,
      step,
    })
  }

  streamTag = (stream: number): string => this.model.problem.streams[stream]?.id ?? ''
  componentTag = (component: number): string => this.model.problem.components[component]?.id ?? ''
  present = (stream: number): readonly number[] => this.model.present[stream] ?? []

  number = (value: number): string =>
    formatNumber(value, 'flow', { decimal: this.view.decimal, digits: this.view.digits.flow, extraDigits: 1 })
  fraction = (value: number): string =>
    formatNumber(value, 'fraction', { decimal: this.view.decimal, typed: true })
      // A typed fraction carries its own digits; what follows keeps four.
      .replace(/(\d[.,]\d{4}\d{3})\d+$/, '$1')

  total(stream: number, family: Family = own): Term {
    const symbols = `${family.letter}(${this.streamTag(stream)})`
    const value = this.known(stream, family.flow)
    return { symbols, numbers: value === undefined ? symbols : this.number(value) }
  }

  /** The flow of a component in a stream: its number, a known fraction of the flow, or its name. Null where it is absent. */
  part(stream: number, component: number, family: Family = own): Term | null {
    const there = this.present(stream)
    if (!there.includes(component)) return null
    const symbols = `${this.componentTag(component)}(${this.streamTag(stream)})`
    const value = this.known(stream, family.componentFlow, component)
    if (value !== undefined) return { symbols, numbers: this.number(value) }
    if (there.length === 1) return { ...this.total(stream, family), symbols }
    const fraction = this.known(stream, family.fraction, component)
    if (fraction === undefined) return { symbols, numbers: symbols }
    return { symbols, numbers: `${this.fraction(fraction)} × ${this.total(stream, family).numbers}` }
  }

  share(stream: number, component: number, family: Family = own): Term {
    const symbols = `x ${this.componentTag(component)}(${this.streamTag(stream)})`
    const value = this.known(stream, family.fraction, component)
    return { symbols, numbers: value === undefined ? symbols : this.fraction(value) }
  }

  static familyOf = (isOther: boolean): Family => (isOther ? other : own)
}

const none: Term = { symbols: '0', numbers: '0' }

/** "a + b", with what is negative taken away. */
export function added(terms: readonly Term[]): Term {
  if (terms.length === 0) return none
  const join = (texts: readonly string[]): string =>
    texts
      .slice(1)
      .reduce((sum, text) => (/^[−-]/.test(text) ? `${sum} − ${text.slice(1)}` : `${sum} + ${text}`), texts[0] ?? '')
  return { symbols: join(terms.map(({ symbols }) => symbols)), numbers: join(terms.map(({ numbers }) => numbers)) }
}

export const equal = (...sides: Term[]): Term => ({
  symbols: sides.map(({ symbols }) => symbols).join(' = '),
  numbers: sides.map(({ numbers }) => numbers).join(' = '),
})
