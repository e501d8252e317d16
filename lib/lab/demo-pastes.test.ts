import { readFileSync } from 'node:fs'
import { join } from 'node:path'
import { describe, expect, it } from 'vitest'
import { readingOf, tableOf } from './reading.fixture'

const paste = (name: string) =>
  readFileSync(join(import.meta.dirname, '../../tests/fixtures/lab', `${name}.txt`), 'utf8')

describe('the demo plants’ pastes', () => {
  it('reads the salt plant’s: units row, replicates, a limit, a trace, by difference', () => {
    const reading = readingOf(paste('demo-a-salt'))
    expect(reading).toMatchObject({ shape: 'wide', decimal: 'point', questions: [], notUnderstood: [], totals: [] })
    expect(tableOf(reading)).toEqual({
      '24-0311': {
        Moisture: 'difference wt%',
        NaCl: 'value 24 wt%',
        MgCl2: 'value 0.6 wt%',
        KCl: 'value 0.4 wt%',
        Ca: 'below 5 mg/kg',
      },
      '24-0312-A ~ 24-0312': {
        Moisture: 'difference wt%',
        NaCl: 'value 22.96 wt%',
        MgCl2: 'value 4.48 wt%',
        KCl: 'value 3.02 wt%',
        Ca: 'value 12 mg/kg',
      },
      '24-0312-B ~ 24-0312': {
        Moisture: 'difference wt%',
        NaCl: 'value 23.04 wt%',
        MgCl2: 'value 4.52 wt%',
        KCl: 'value 2.98 wt%',
        Ca: 'value 11 mg/kg',
      },
      '24-0313': {
        Moisture: 'value 3 wt%',
        NaCl: 'notAnalysed wt%',
        MgCl2: 'value 0.194 wt%',
        KCl: 'trace wt%',
        Ca: 'below 5 mg/kg',
      },
    })
    expect(reading.samples.map(({ stream, takenAt }) => [stream, takenAt])).toEqual([
      ['101', '2026-03-14T06:00'],
      ['108', '2026-03-14T06:10'],
      ['108', '2026-03-14T06:10'],
      ['107', '2026-03-14T06:25'],
    ])
  })

  it('reads the citrus plant’s: German, decimal comma, samples across, a sum', () => {
    const reading = readingOf(paste('demo-b-citrus'))
    expect(reading).toMatchObject({ shape: 'transposed', decimal: 'comma', questions: [], notUnderstood: [] })
    const solids = '°Brix / Gew.-%'
    expect(tableOf(reading)).toEqual({
      'Pressschale frisch': {
        Wasser: 'value 80 Gew.-%',
        'lösl. Trockenmasse': `value 10.5 ${solids}`,
        Faser: 'value 8.6 Gew.-%',
        'd-Limonen': 'value 0.9 Gew.-%',
      },
      Presssaft: {
        Wasser: 'blank Gew.-%',
        'lösl. Trockenmasse': `value 14.5 ${solids}`,
        Faser: 'notDetected Gew.-%',
        'd-Limonen': 'blank Gew.-%',
      },
      Melasse: {
        Wasser: 'blank Gew.-%',
        'lösl. Trockenmasse': `value 50 ${solids}`,
        Faser: 'notDetected Gew.-%',
        'd-Limonen': 'below 0.01 Gew.-%',
      },
      Pellets: {
        Wasser: 'value 10 Gew.-%',
        'lösl. Trockenmasse': `blank ${solids}`,
        Faser: 'value 56 Gew.-%',
        'd-Limonen': 'value 0.1 Gew.-%',
      },
    })
    expect(reading.samples.map(({ stream }) => stream)).toEqual(['1', '4', '6', '11'])
    expect(reading.totals).toMatchObject([{ label: 'Summe', results: [{ sample: 'Pressschale frisch', value: 100 }] }])
  })

  it('reads the black mass plant’s: a result a row, bases of both kinds, a sign in a column of its own', () => {
    const reading = readingOf(paste('demo-c-blackmass'))
    expect(reading).toMatchObject({ shape: 'long', decimal: 'point', questions: [], notUnderstood: [], totals: [] })
    expect(tableOf(reading)).toEqual({
      'NV-0071': { Co: 'value 34.92 wt% as-received', Moisture: 'value 4 wt% as-received' },
      'NV-0075': { Co: 'value 63.12 g/kg as-received', H2O2: 'value 0.05 wt% as-received' },
      'NV-0077': {
        Moisture: 'value 35 wt% as-received',
        'Co (acid-insoluble)': 'value 2.55 wt% dry',
        'Co (water-soluble)': 'value 456 mg/kg as-received',
        Li: 'value 38 mg/kg as-received',
        Fe: 'below 0.01 wt% dry',
      },
    })
    expect(reading.samples).toMatchObject([
      { stream: '301', takenAt: '2026-05-02T08:00', method: 'ICP-OES; 105C' },
      { stream: '307', takenAt: '2026-05-02T08:30' },
      { stream: '310', takenAt: '2026-05-02T08:40' },
    ])
  })

  it('reads the biogas plant’s: columns of spaces, streams in the heads, a word it does not understand', () => {
    const reading = readingOf(paste('demo-d-biogas'))
    expect(reading).toMatchObject({ shape: 'transposed', decimal: 'point', questions: [] })
    expect(tableOf(reading)).toEqual({
      'Raw (401)': {
        CH4: 'value 56 mol%',
        CO2: 'value 40 mol%',
        N2: 'value 0.3 mol%',
        O2: 'value 1500 ppmv',
        H2S: 'value 500 ppmv',
        H2O: 'value 3.5 mol%',
      },
      'Product (407)': {
        CH4: 'value 97.6 mol%',
        CO2: 'value 1.8 mol%',
        N2: 'value 0.44 mol%',
        O2: 'value 1570 ppmv',
        H2S: 'below 1 ppmv',
      },
      'Off-gas (410)': {
        CH4: 'value 1.2 mol%',
        CO2: 'value 98.6 mol%',
        N2: 'value 0.12 mol%',
        O2: 'value 900 ppmv',
        H2S: 'below 1 ppmv',
      },
    })
    expect(reading.samples.map(({ stream }) => stream)).toEqual(['401', '407', '410'])
    expect(reading.notUnderstood).toEqual([
      { row: 8, column: 4, raw: 'dry' },
      { row: 8, column: 5, raw: 'dry' },
    ])
    expect(reading.totals).toMatchObject([{ label: 'SUM', results: [{ value: 100 }, { value: 100 }, { value: 100 }] }])
  })
})
