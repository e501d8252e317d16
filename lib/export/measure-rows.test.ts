import { describe, expect, it } from 'vitest'
import { solve } from '@/lib/balance'
import type { Problem } from '@/lib/balance/problem'
import { fromProblem } from '@/lib/book/from-problem'
import { inOrder, stateOf } from '@/lib/book/state'
import { toProblem } from '@/lib/book/to-problem'
import { defaultUnits, givensOf } from './givens-list'
import { streamTable } from './stream-table'

const pulp: Problem = {
  format: 'tallybrook/1',
  name: 'Pulp',
  basis: 'mass',
  flowUnit: 't/h',
  components: [{ id: 'Ore' }, { id: 'Water' }],
  streams: [{ id: '1' }, { id: '2', components: ['Water'] }],
  units: [],
  links: {},
  givens: [
    { stream: '1', quantity: 'flow', value: 100 },
    { stream: '1', quantity: 'massFraction', component: 'Ore', value: 0.4 },
    { stream: '2', quantity: 'groupMassRatio', parts: ['Ore'], value: 0 },
    { stream: '1', quantity: 'groupMassRatio', parts: ['Water'], over: ['Ore'], value: 1.5, instrument: 'gauge' },
  ],
}

describe('rows that people added, in the export', () => {
  let count = 0
  const state = stateOf(fromProblem(pulp, () => `id-${++count}`))
  const caseId = inOrder(state.case)[0]?.id ?? ''
  const { problem, leftOut, wanted, rows } = toProblem(state, caseId)

  it('stand in a block of their own, with states and units', () => {
    const table = streamTable(state, { problem, solution: solve(problem, wanted), rows })
    const block = table.blocks.find(({ title }) => title === 'Further measures')
    expect(block?.rows.map(({ label, unit }) => [label, unit])).toEqual([
      ['Ore in all', 'kg/kg'],
      ['Water : Ore', 'kg/kg'],
    ])
    expect(block?.rows[1]?.cells.map(({ state: its }) => its)).toEqual(['given', 'absent'])
    expect(block?.rows[0]?.cells[0]?.state).toBe('solvable')
    expect(block?.rows[0]?.cells[0]?.value).toBeCloseTo(0.4, 12)
  })

  it('name their givens by what the row is', () => {
    const lines = givensOf(
      state,
      caseId,
      leftOut,
      defaultUnits({ mass: 't/h', mole: 'kmol/h', volume: 'm3/h' }, 'mass'),
    )
    const line = lines.find(({ instrument }) => instrument === 'gauge')
    expect(line).toMatchObject({
      measure: 'mass ratio',
      component: 'Water : Ore',
      value: 1.5,
      unit: 'of 1',
      remark: '',
    })
  })
})
