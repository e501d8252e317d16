import { describe, expect, it } from 'vitest'
import type { Problem } from '@/lib/balance/problem'
import { exportCase, smallFlows, smallProblem } from '@/tests/export-case'
import { handSolution } from '@/tests/hand-solution'
import { type ClosureModel, closureModel } from './closure'

function closureOf(problem: Problem): ClosureModel {
  const { solved } = exportCase(problem, (taken) => handSolution(taken, smallFlows, { X: 0.5 }))
  return closureModel(solved.problem, solved.solution)
}
const withInventory = (inventory: { component?: string; value: number; unit?: string }[]): Problem => ({
  ...smallProblem,
  units: smallProblem.units.map((unit) => (unit.id === 'R' ? { ...unit, inventory } : unit)),
})

describe('closureModel', () => {
  it('lists for each unit what enters and leaves, component by component and in total', () => {
    const [mixer, reactor, whole] = closureOf(smallProblem).groups
    expect(mixer?.lines.map(({ component, inlets, outlets }) => [component, inlets, outlets])).toEqual([
      [0, [0, 1], [2]],
      [1, [0], [2]],
      [null, [0, 1], [2]],
    ])
    expect(reactor?.lines.map(({ formed }) => formed.length)).toEqual([1, 1, 2])
    expect(whole?.title).toBe('Whole process')
    expect(whole?.lines.map(({ inlets, outlets }) => [inlets, outlets])).toEqual([
      [[0, 1], [3]],
      [[0], [3]],
      [[0, 1], [3]],
    ])
  })

  it('gives coefficient, molar mass and scale of each formed component', () => {
    const rounded = {
      ...smallProblem,
      components: [
        { id: 'A', molarMass: 40.01 },
        { id: 'B', molarMass: 20 },
      ],
    }
    const { formations, extents, extentUnit } = closureOf(rounded)
    expect(formations.map(({ coefficient, molarMass }) => [coefficient, molarMass])).toEqual([
      [-1, 40.01],
      [2, 20],
    ])
    const masses = formations.map(({ coefficient, molarMass, scale }) => coefficient * molarMass * scale)
    expect(Math.abs((masses[0] ?? 0) + (masses[1] ?? 0))).toBeLessThan(1e-12)
    expect(formations[1]?.scale).toBeCloseTo(40.01 / 40, 12)
    expect([extents[0]?.value, extentUnit]).toEqual([0.5, 'kmol/h'])
  })

  it('takes gains in the unit they were typed in, and splits no gain of the total', () => {
    const [, byPart, whole] = closureOf(withInventory([{ component: 'B', value: 0.024, unit: 't/d' }])).groups
    expect(byPart?.lines.map(({ gain }) => gain)).toEqual([0, 1, 1])
    expect(whole?.lines.map(({ gain }) => gain)).toEqual([0, 1, 1])
    const [, inTotal] = closureOf(withInventory([{ value: 5 }])).groups
    expect(inTotal?.lines.map(({ gain }) => gain)).toEqual(['notSplit', 'notSplit', 5])
  })

  it('says why a unit cannot be balanced', () => {
    const open = { ...smallProblem, reactions: [], links: { M: { '1': 'in' as const }, R: { '4': 'out' as const } } }
    expect(closureOf(open).groups.map((group) => group.open)).toEqual(['nothing leaves', 'nothing enters', null])
    expect(closureOf({ ...smallProblem, reactions: [], links: {} }).groups.map((group) => group.open)).toEqual([
      'no stream is connected',
      'no stream is connected',
      'no stream crosses its boundary',
    ])
  })
})
