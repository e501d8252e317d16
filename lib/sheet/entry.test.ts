import { describe, expect, it } from 'vitest'
import { type EntryContext, entryMeasure, readEntry, typedOf } from './entry'

const mass: EntryContext = { measure: 'massFlow', unit: 'kg/h', decimal: 'point' }
const mole: EntryContext = { measure: 'moleFlow', unit: 'kmol/h', decimal: 'point' }
const volume: EntryContext = { measure: 'volumeFlow', unit: 'm3/h', decimal: 'point' }
const massFraction: EntryContext = { measure: 'massFraction', unit: '%', decimal: 'point' }
const moleFraction: EntryContext = { measure: 'moleFraction', unit: '%', decimal: 'point' }

describe('entries that are understood', () => {
  const cases: [text: string, context: EntryContext, value: number, unit: string, halfWidth: number][] = [
    ['50 000', mass, 50_000, 'kg/h', 0.5],
    ['12.5 t/d', mass, 12.5, 't/d', 0.05],
    ['12.5 t / d', mass, 12.5, 't/d', 0.05],
    ['3 kg/hr', mass, 3, 'kg/h', 0.5],
    ['100 lb/h', mass, 100, 'lb/h', 0.5],
    ['1.2e3', mass, 1200, 'kg/h', 50],
    ['−5', mass, -5, 'kg/h', 0.5],
    ['350 ppm', massFraction, 350, 'ppm', 0.5],
    ['2 %', massFraction, 2, '%', 0.5],
    ['2 wt%', massFraction, 2, '%', 0.5],
    ['24.00', massFraction, 24, '%', 0.005],
    ['1940 mg/kg', massFraction, 1940, 'mg/kg', 0.5],
    ['62 mol%', moleFraction, 62, '%', 0.5],
    ['0.62 mol/mol', moleFraction, 0.62, 'mol/mol', 0.005],
    ['5 mol/s', mole, 5, 'mol/s', 0.5],
    ['7 L/min', volume, 7, 'L/min', 0.5],
    ['3,5', { ...mass, decimal: 'comma' }, 3.5, 'kg/h', 0.05],
  ]
  it.each(cases)('%s', (text, context, value, unit, halfWidth) => {
    expect(readEntry(text, context)).toEqual({ ok: true, clear: false, text, value, unit, halfWidth })
  })
})

describe('entries that are refused, with what to do', () => {
  const cases: [text: string, context: EntryContext, reason: RegExp][] = [
    ['=A1*2', mass, /not formulas/],
    ['<0.01', massFraction, /limit, not a value/],
    ['~5', mass, /uncertainty goes on the cell card/],
    ['5 ± 1', mass, /uncertainty goes on the cell card/],
    ['3,5', mass, /type 3\.5/],
    ['12 furlongs', mass, /“furlongs” is not a unit known here\. These fit here: kg\/h, kg\/d, t\/h/],
    ['5 kmol/h', mass, /unit of mole flow, and this row is a mass flow/],
    ['5 kg/h', mole, /unit of mass flow, and this row is a mole flow/],
    ['5 m3/h', mass, /unit of volume flow/],
    ['5 kg', mass, /an amount, and this row is a flow/],
    ['5 kg/h', { ...mass, unit: 'kg' }, /amounts of a batch/],
    ['2 %', mass, /unit of a fraction, and this row is a mass flow/],
    ['2 mol%', massFraction, /type it in the mole fraction row/],
    ['2 wt%', moleFraction, /type it in the mass fraction row/],
    ['5 kg/h', massFraction, /unit of mass flow, and this row is a mass fraction\. These fit here: %/],
    ['5 apples', massFraction, /not a unit known here\. These fit here: %/],
    ['n.d.', massFraction, /not a number/],
  ]
  it.each(cases)('%s', (text, context, reason) => {
    const entry = readEntry(text, context)
    expect(entry).toMatchObject({ ok: false, text })
    expect(!entry.ok && entry.reason).toMatch(reason)
    expect(typedOf(entry)).toEqual({ text, value: null })
  })
})

it('clears a cell with nothing or blanks', () => {
  for (const text of ['', '   ', '\t', '\u00a0']) expect(typedOf(readEntry(text, mass))).toBeNull()
})

it('keeps what was typed word for word', () => {
  expect(typedOf(readEntry(' 12.50 t/d ', mass))).toEqual({
    text: ' 12.50 t/d ',
    value: 12.5,
    unit: 't/d',
    halfWidth: 0.005,
  })
})

it('knows what a row takes by the basis of the book', () => {
  expect(entryMeasure('flow', 'mass')).toBe('massFlow')
  expect(entryMeasure('componentFlow', 'mole')).toBe('moleFlow')
  expect(entryMeasure('componentMassFlow', 'mole')).toBe('massFlow')
  expect(entryMeasure('moleFraction', 'mass')).toBe('moleFraction')
})
