import { describe, expect, it } from 'vitest'
import { CellFlag, CellState, slotOf } from '@/lib/balance/solution'
import { exportCase, smallFlows, smallProblem } from '@/tests/export-case'
import { handSolution } from '@/tests/hand-solution'
import { streamTable } from './stream-table'
import type { ExportRow, RowMeasure, StreamTable } from './table-model'

const tableOf = (flows: Record<string, Record<string, number>> = smallFlows, problem = smallProblem): StreamTable => {
  const { state, solved } = exportCase(problem, (taken) => handSolution(taken, flows, { X: 0.5 }))
  return streamTable(state, solved)
}
const rowOf = (table: StreamTable, measure: RowMeasure, component: number | null): ExportRow => {
  const row = table.blocks
    .flatMap(({ rows }) => rows)
    .find((one) => one.measure === measure && one.component === component)
  if (!row) throw new Error(`No row ${measure} ${component}`)
  return row
}
const valuesOf = (row: ExportRow) => row.cells.map(({ value }) => value)
const statesOf = (row: ExportRow) => row.cells.map(({ state }) => state)

describe('streamTable', () => {
  it('has a row for each measure, each with its unit', () => {
    const table = tableOf()
    expect(table.blocks.map(({ title, rows }) => [title, rows.map(({ label, unit }) => `${label} ${unit}`)])).toEqual([
      [null, ['Total flow kg/h']],
      ['Mass fraction', ['Acid (A) wt %', 'Base (B) wt %']],
      ['Component flow', ['Acid (A) kg/h', 'Base (B) kg/h']],
      ['Mole flow', ['Total mole flow kmol/h', 'Acid (A) kmol/h', 'Base (B) kmol/h']],
      ['Mole fraction', ['Acid (A) mol %', 'Base (B) mol %']],
      ['Volume flow', ['Volume flow m3/h']],
    ])
  })

  it('gives numbers whole, fractions in per cent, and the state of each', () => {
    const table = tableOf()
    expect(valuesOf(rowOf(table, 'flow', null))).toEqual([100, 15, 115, 115])
    expect(statesOf(rowOf(table, 'flow', null))).toEqual(['given', 'solvable', 'solvable', 'solvable'])
    expect(valuesOf(rowOf(table, 'fraction', 0))[0]).toBe(25)
    expect(statesOf(rowOf(table, 'fraction', 0))[0]).toBe('given')
    expect(valuesOf(rowOf(table, 'componentFlow', 1))).toEqual([75, null, 75, 95])
    expect(statesOf(rowOf(table, 'componentFlow', 1))).toEqual(['solvable', 'absent', 'solvable', 'solvable'])
    expect(valuesOf(rowOf(table, 'otherFlow', null))[0]).toBeCloseTo(25 / 40 + 75 / 20, 12)
    expect(valuesOf(rowOf(table, 'volumeFlow', null))).toEqual([0.1, null, null, null])
  })

  it('says from and to, and keeps phase, density, temperature and pressure as notes', () => {
    const { state, solved } = exportCase(smallProblem, (taken) => handSolution(taken, smallFlows))
    const stream = [...state.stream.values()][0]
    if (!stream) throw new Error('no stream')
    const changed = new Map(state.stream).set(stream.id, { ...stream, phase: 'liquid', temperature: '25 C' })
    const table = streamTable({ ...state, stream: changed }, solved)
    expect(table.streams.map(({ from, to }) => [from, to])).toEqual([
      ['', 'M'],
      ['', 'M'],
      ['M', 'R'],
      ['R', ''],
    ])
    expect(table.streams[0]?.phase).toBe('liquid')
    expect(table.carried.map(({ label, texts }) => [label, texts])).toEqual([
      ['Density', [1000, null, null, null]],
      ['Temperature', ['25 C', null, null, null]],
    ])
    expect(table.connections.map(({ ends }) => ends)).toEqual([
      ['in', 'in', 'out', null],
      [null, null, 'in', 'out'],
    ])
  })

  it('has no number where a cell is unknown, and a zero where one is known', () => {
    const { '3': _, ...known } = smallFlows
    const table = tableOf({ ...known, '2': { A: 0 } })
    expect(rowOf(table, 'flow', null).cells[2]).toEqual({ state: 'unknown', value: null, flags: [] })
    expect(rowOf(table, 'flow', null).cells[1]?.value).toBe(0)
    expect(rowOf(table, 'componentFlow', 0).cells[1]).toEqual({ state: 'solvable', value: 0, flags: [] })
  })

  it('leaves the other basis out where no stream has it, and marks cells where only some have', () => {
    const [acid, base] = smallProblem.components
    const { molarMass: _, ...bare } = base as { id: string; molarMass: number }
    const some = tableOf(smallFlows, { ...smallProblem, reactions: [], components: [acid as { id: string }, bare] })
    expect(statesOf(rowOf(some, 'otherFlow', null))).toEqual(['noMolarMass', 'solvable', 'noMolarMass', 'noMolarMass'])
    expect(statesOf(rowOf(some, 'otherComponentFlow', 1))).toEqual([
      'noMolarMass',
      'absent',
      'noMolarMass',
      'noMolarMass',
    ])
    const none = tableOf(smallFlows, { ...smallProblem, reactions: [], components: [{ id: 'A' }, { id: 'B' }] })
    expect(none.blocks.map(({ title }) => title)).toEqual([null, 'Mass fraction', 'Component flow', 'Volume flow'])
  })

  it('never makes a number of what has none, whatever the state says', () => {
    const { state, solved } = exportCase(smallProblem, (taken) => {
      const solution = handSolution(taken, smallFlows)
      solution.values[slotOf(2, 3, 'flow')] = Number.NaN
      solution.values[slotOf(2, 2, 'flow')] = Number.POSITIVE_INFINITY
      solution.states[slotOf(2, 0, 'flow')] = CellState.atOdds
      solution.flags[slotOf(2, 0, 'flow')] = CellFlag.negative | CellFlag.amplified
      return solution
    })
    expect(rowOf(streamTable(state, solved), 'flow', null).cells).toEqual([
      { state: 'atOdds', value: 100, flags: ['negative', 'amplified'] },
      { state: 'solvable', value: 15, flags: [] },
      { state: 'unknown', value: null, flags: [] },
      { state: 'unknown', value: null, flags: [] },
    ])
  })
})
