import { readFileSync } from 'node:fs'
import { join } from 'node:path'
import { describe, expect, it } from 'vitest'
import type { Problem } from '../problem'
import { solve } from '../solve'
import { closureOf } from './closure'

const plant = (name: string): Problem =>
  JSON.parse(readFileSync(join(import.meta.dirname, '../../../tests/fixtures/demo', name), 'utf8')) as Problem

describe('closure', () => {
  it.each(['demo-a-salt', 'demo-c-blackmass', 'demo-d-biogas'])(
    '%s closes round each unit and the whole, in every component and element',
    (name) => {
      const problem = plant(`${name}.book.json`)
      const solution = solve(problem)
      const ids = problem.units.map(({ id }) => id)
      for (const units of [...ids.map((id) => [id]), ids]) {
        const lines = closureOf(problem, solution, units)
        expect(lines[0]?.kind).toBe('total')
        expect(lines.length).toBeGreaterThan(1)
        for (const line of lines) expect(Math.abs(line.percent as number), JSON.stringify(line)).toBeLessThan(1e-6)
      }
    },
  )

  const tank: Problem = {
    format: 'tallybrook/1',
    name: 'tank',
    basis: 'mass',
    flowUnit: 'kg/h',
    components: [{ id: 'A' }],
    streams: [{ id: '1' }, { id: '2' }],
    units: [{ id: 'T', kind: 'mixer', inventory: [{ component: 'A', value: 0.01, unit: 't/h' }] }],
    links: { T: { 1: 'in', 2: 'out' } },
    givens: [{ stream: '1', quantity: 'flow', value: 100 }],
  }

  it('takes what a unit gains into account, in its own unit', () => {
    expect(closureOf(tank, solve(tank), ['T'])[0]).toEqual({
      kind: 'total',
      in: 100,
      out: 90,
      made: 0,
      held: 10,
      difference: 0,
      percent: 0,
    })
  })

  it('shows what does not close, and nothing where a flow is unknown', () => {
    const typed = solve({
      ...tank,
      units: [{ id: 'T', kind: 'mixer' }],
      givens: [...(tank.givens ?? []), { stream: '2', quantity: 'flow', value: 80 }],
    })
    expect(closureOf({ ...tank, units: [{ id: 'T', kind: 'mixer' }] }, typed, ['T'])[0]).toMatchObject({
      difference: 20,
      percent: 20,
    })
    const open = { ...tank, givens: [] }
    expect(closureOf(open, solve(open), ['T'])[0]).toMatchObject({ in: undefined, difference: undefined })
  })
})
