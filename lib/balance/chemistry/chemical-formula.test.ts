import { describe, expect, it } from 'vitest'
import { molarMassOf, parseFormula } from './chemical-formula'
import { elementGaps, massGap } from './reaction-balance'

describe('chemical formulas', () => {
  it.each([
    ['H2O', { H: 2, O: 1 }],
    ['Ca(OH)2', { Ca: 1, O: 2, H: 2 }],
    ['CuSO4.5H2O', { Cu: 1, S: 1, O: 9, H: 10 }],
    ['CuSO4·5H2O', { Cu: 1, S: 1, O: 9, H: 10 }],
    ['CaSO4.0.5H2O', { Ca: 1, S: 1, O: 4.5, H: 1 }],
    ['Fe0.95O', { Fe: 0.95, O: 1 }],
    ['K4[Fe(CN)6]', { K: 4, Fe: 1, C: 6, N: 6 }],
    ['H₂SO₄', { H: 2, S: 1, O: 4 }],
  ])('%s', (text, atoms) => {
    expect(parseFormula(text)).toEqual(atoms)
  })

  it.each(['', 'Xx2', 'h2o', 'H2(O', 'H2)O', '2', 'H2O + O2', 'SO4--'])('"%s" is none', (text) => {
    expect(parseFormula(text)).toBeUndefined()
  })

  // Sums of the abridged standard atomic weights (IUPAC, 2021).
  it.each([
    ['H2O', 18.015],
    ['CO2', 44.009],
    ['H2SO4', 98.072],
    ['CaSO4.2H2O', 172.164],
    ['C6H12O6', 180.156],
    ['CuFeS2', 183.511],
  ])('%s weighs %f g/mol', (text, mass) => {
    expect(molarMassOf(text)).toBeCloseTo(mass, 3)
  })
})

describe('reactions', () => {
  it('balance by elements and by mass', () => {
    const atoms = ['H2', 'O2', 'H2O'].map((text) => parseFormula(text) as Record<string, number>)
    expect(elementGaps([-2, -1, 2], atoms)).toEqual([])
    expect(elementGaps([-1, -1, 1], atoms)).toEqual([['O', -1]])
    expect(massGap([-2, -1, 2], [2.016, 31.998, 18.015])).toBeCloseTo(0, 12)
  })
})
