import { describe, expect, it } from 'vitest'
import { bookUnitOf, convert, parseUnit, toBookUnit, unitFits, unitsFor } from './units'

/** Exact by definition: NIST Special Publication 811, appendix B. */
const factors: [string, string, number][] = [
  ['lb', 'kg', 0.45359237],
  ['st', 'kg', 907.18474],
  ['lt', 'kg', 1016.0469088],
  ['ft3', 'm3', 0.028316846592],
  ['gal', 'm3', 0.003785411784],
  ['bbl', 'm3', 0.158987294928],
  ['gal_uk', 'm3', 0.00454609],
  ['lbmol', 'mol', 453.59237],
  ['oz', 'g', 28.349523125],
  ['t/d', 'kg/h', 1000 / 24],
  ['kg/s', 'kg/h', 3600],
  ['t/a', 'kg/d', 1000 / 365],
  ['mol/s', 'kmol/h', 3.6],
  ['L/min', 'm3/h', 0.06],
  ['%', '1', 0.01],
  ['ppm', '1', 1e-6],
  ['g/kg', '%', 0.1],
  ['mg/kg', 'ppm', 1],
  ['µg/kg', 'ppb', 1],
]

describe('units of measure', () => {
  it.each(factors)('1 %s is so many %s', (from, to, factor) => {
    expect(convert(1, from, to) as number).toBeCloseTo(factor, 12)
    expect(convert(factor, to, from) as number).toBeCloseTo(1, 12)
  })

  it('does not convert what does not fit', () => {
    expect(convert(1, 'kg/h', 'kmol/h')).toBeUndefined()
    expect(convert(1, 'kg/h', 'kg')).toBeUndefined()
    expect(convert(1, 'wt%', 'mol%')).toBeUndefined()
    expect(convert(1, 'kg/h', '%')).toBeUndefined()
    expect(parseUnit('kg/fortnight')).toBeUndefined()
  })

  it('keeps capitals apart: Mt is a million tonnes, mg a milligram, Mg a tonne', () => {
    expect(convert(1, 'Mt/a', 't/a')).toBe(1e6)
    expect(convert(1, 'Mg', 'kg')).toBe(1000)
    expect(convert(1, 'mg', 'kg')).toBe(1e-6)
  })

  it('gives the mole unit that goes with a book’s mass unit', () => {
    const moles = (flowUnit: string) => bookUnitOf('moleFlow', 'mass', flowUnit)
    expect(['kg/h', 'g/s', 't/d', 'lb/h', 'kg'].map(moles)).toEqual(['kmol/h', 'mol/s', 'kmol/d', 'lbmol/h', 'kmol'])
    expect(bookUnitOf('massFlow', 'mole', 'mol/s')).toBe('g/s')
    expect(bookUnitOf('volumeFlow', 'mass', 't/d')).toBe('m3/d')
  })

  it('reads typed values into the book’s unit', () => {
    expect(toBookUnit(12.5, 't/d', 'flow', 'mass', 'kg/h')).toBeCloseTo(520.8333333333, 9)
    expect(toBookUnit(350, 'ppm', 'massFraction', 'mass', 'kg/h')).toBeCloseTo(3.5e-4, 15)
    expect(toBookUnit(1, 'kmol/h', 'flow', 'mass', 'kg/h')).toBeUndefined()
    expect(unitFits('mol%', 'massFraction', 'mass', 'kg/h')).toBe(false)
  })

  it('offers units that fit', () => {
    expect(unitsFor('mass')).toContain('kg/h')
    expect(unitsFor('mass', true)).toContain('t')
    expect(unitsFor('moleFraction')).toContain('mol%')
    expect(unitsFor('moleFraction')).not.toContain('mg/kg')
  })
})
