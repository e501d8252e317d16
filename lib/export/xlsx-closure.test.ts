import { describe, expect, it } from 'vitest'
import type { Problem } from '@/lib/balance/problem'
import { CellState, slotOf } from '@/lib/balance/solution'
import { balances, type ClosureRow, calculated, rowOf, streams } from '@/tests/closure-sheet'
import { demoProblem, type ExportCase, exportCase, smallFlows, smallProblem, workbookOf } from '@/tests/export-case'
import { handSolution } from '@/tests/hand-solution'
import { readWorkbook, rowsOf, sheetOf } from '@/tests/workbook'

function expectAllClosed(rows: ClosureRow[], throughput: number): void {
  for (const row of [...balances(rows), ...streams(rows).filter(({ in: into }) => into !== null)]) {
    expect([row.place, row.component, typeof row.difference]).toEqual([row.place, row.component, 'number'])
    expect(Math.abs(row.difference as number)).toBeLessThanOrEqual(1e-9 * throughput)
    expect(row.unknown).toBe(0)
  }
  for (const row of balances(rows))
    expect([row.place, row.component, row.finding]).toEqual([row.place, row.component, 'closed'])
  for (const row of streams(rows)) if (row.in !== null) expect(row.finding).toBeCloseTo(100, 7)
}

const largestFlow = ({ solved: { solution } }: ExportCase): number => {
  let most = 0
  for (let stream = 0; stream < solution.nStreams; stream++)
    most = Math.max(most, solution.values[slotOf(solution.nComponents, stream, 'flow')] ?? 0)
  return most
}

describe('closure of the solver’s answer', () => {
  it.each(['a-salt', 'b-citrus', 'c-blackmass', 'd-biogas'])('demo %s closes by its formulas', async (name) => {
    const input = exportCase(demoProblem(name))
    expect(input.solved.solution.status).toBe('solved')
    const { rows } = await calculated(input)
    const groups = input.solved.problem.units.length + 1
    expect(balances(rows).filter(({ component }) => component === 'Total')).toHaveLength(groups)
    expectAllClosed(rows, largestFlow(input))
  })

  it.each(['a-salt', 'c-blackmass', 'd-biogas'])('demo %s has the numbers of the solver in its table', async (name) => {
    const input = exportCase(demoProblem(name))
    const { problem, solution } = input.solved
    const sheet = sheetOf(readWorkbook(await workbookOf(input)), 'Stream table')
    const n = problem.components.length
    const rows = rowsOf(sheet)
    const unit = problem.basis === 'mass' ? ['kg/h', 'wt %'] : ['kmol/h', 'mol %']
    const blockRow = (heading: string, c: number, itsUnit: string) => {
      const start = rows.findIndex(([first]) => first === heading)
      const row = rows[start + 1 + c] ?? []
      expect(row[1]).toBe(itsUnit)
      return row
    }
    const [total] = rows.filter(([first]) => first === 'Total flow')
    problem.streams.forEach((stream, s) => {
      const here = (quantity: 'flow' | 'componentFlow' | 'fraction', c = 0) =>
        solution.values[slotOf(n, s, quantity, c)] as number
      expect(total?.[s + 2]).toBe(here('flow'))
      problem.components.forEach(({ id }, c) => {
        const flow = blockRow('Component flow', c, unit[0] as string)[s + 2]
        const fraction = blockRow(problem.basis === 'mass' ? 'Mass fraction' : 'Mole fraction', c, unit[1] as string)[
          s + 2
        ]
        if (stream.components && !stream.components.includes(id)) expect([flow, fraction]).toEqual(['–', '–'])
        else expect([flow, fraction]).toEqual([here('componentFlow', c), 100 * here('fraction', c)])
      })
    })
  })

  it('closes with a gain of what a unit holds, and shows the gain', async () => {
    const problem = demoProblem('a-salt')
    const held = [
      { component: 'NaCl', value: 240, unit: 'kg/d' },
      { component: 'H2O', value: -30 },
    ]
    const units = problem.units.map((unit) => (unit.id === 'D-106' ? { ...unit, inventory: held } : unit))
    const input = exportCase({ ...problem, units })
    expect(input.solved.solution.status).toBe('solved')
    const { rows } = await calculated(input)
    const dryer = balances(rows).filter(({ place }) => place.startsWith('D-106'))
    expect(dryer.map(({ gain }) => gain)).toEqual([-30, 10, 0, 0, -20])
    expectAllClosed(rows, largestFlow(input))
  })

  it('shows honestly what over-measured readings leave open', async () => {
    const input = exportCase(demoProblem('e-whey'))
    const { rows } = await calculated(input)
    const { problem, solution } = input.solved
    for (const row of balances(rows))
      if (typeof row.difference === 'number') {
        const sum = (row.in as number) - (row.out as number) + (row.formed as number) - (row.gain as number)
        expect(row.difference).toBeCloseTo(sum, 6)
      } else expect(row.difference).toMatch(/^not (closed: \d+ unknown|checked)$/)
    const claimed = balances(rows).filter(({ finding }) => finding === 'closed')
    for (const row of claimed)
      expect(Math.abs(row.difference as number)).toBeLessThanOrEqual(
        Math.max(1e-3 * Math.max(Number(row.in), Number(row.out)), 1e-4),
      )
    expect(problem.streams).toHaveLength(solution.nStreams)
  })
})

describe('closure formulas', () => {
  const small = (
    flows: Record<string, Record<string, number>>,
    extents: Record<string, number> = { X: 0.5 },
    problem: Problem = smallProblem,
  ) => exportCase(problem, (taken) => handSolution(taken, flows, extents))

  it('count reactions as coefficient x molar mass x extent', async () => {
    const { rows } = await calculated(small(smallFlows))
    expect(rowOf(rows, 'R  Reactor', 'Acid (A)')).toMatchObject({
      in: 40,
      out: 20,
      formed: -20,
      difference: 0,
      finding: 'closed',
    })
    expect(rowOf(rows, 'R  Reactor', 'Base (B)')).toMatchObject({ in: 75, out: 95, formed: 20, difference: 0 })
    expect(rowOf(rows, 'Whole process', 'Total')).toMatchObject({ in: 115, out: 115, formed: 0, difference: 0 })
  })

  it('never take an unknown for zero', async () => {
    const { '3': _, ...known } = smallFlows
    const { rows } = await calculated(small(known, {}))
    expect(rowOf(rows, 'M  Mixer', 'Acid (A)')).toMatchObject({
      in: 40,
      out: 'unknown',
      difference: 'not closed: 1 unknown',
      unknown: 1,
    })
    // The flow in and the extent.
    expect(rowOf(rows, 'R  Reactor', 'Base (B)')).toMatchObject({
      in: 'unknown',
      formed: 'unknown',
      difference: 'not closed: 2 unknown',
    })
    expect(rowOf(rows, 'Whole process', 'Acid (A)')).toMatchObject({
      in: 40,
      out: 20,
      difference: 'not closed: 1 unknown',
    })
    expect(streams(rows)[2]).toMatchObject({
      in: 'unknown',
      difference: 'not closed: 3 unknown',
      finding: 'not summed: 2 unknown',
    })
  })

  it('find what does not close', async () => {
    const { rows } = await calculated(small({ ...smallFlows, '4': { A: 20, B: 90 } }))
    expect(rowOf(rows, 'R  Reactor', 'Base (B)')).toMatchObject({ difference: 5, finding: 'does not close' })
    expect(rowOf(rows, 'R  Reactor', 'Acid (A)')).toMatchObject({ difference: 0, finding: 'closed' })
    expect(rowOf(rows, 'Whole process', 'Total')).toMatchObject({ difference: 5, finding: 'does not close' })
  })

  it('find a total that is not the sum of its parts, and fractions that do not add up', async () => {
    const input = exportCase(smallProblem, (taken) => {
      const solution = handSolution(taken, smallFlows, { X: 0.5 })
      solution.values[slotOf(2, 3, 'flow')] = 120
      solution.values[slotOf(2, 3, 'fraction', 0)] = 0.2
      solution.states[slotOf(2, 3, 'flow')] = CellState.atOdds
      return solution
    })
    const { rows } = await calculated(input)
    expect(streams(rows)[3]).toMatchObject({ in: 120, out: 115, difference: 5 })
    expect(streams(rows)[3]?.finding).toBeCloseTo(20 + (100 * 95) / 115, 9)
  })

  it('do not check a component whose gain is typed in total only', async () => {
    const units = smallProblem.units.map((unit) => (unit.id === 'R' ? { ...unit, inventory: [{ value: 15 }] } : unit))
    const { rows } = await calculated(
      small({ ...smallFlows, '4': { A: 10, B: 90 } }, { X: 0.5 }, { ...smallProblem, units }),
    )
    expect(rowOf(rows, 'R  Reactor', 'Acid (A)')).toMatchObject({ gain: 'not split', difference: 'not checked' })
    expect(rowOf(rows, 'R  Reactor', 'Total')).toMatchObject({ gain: 15, difference: 0, finding: 'closed' })
  })

  it('balance elements where a reactor is balanced so', async () => {
    const problem: Problem = {
      ...smallProblem,
      components: [
        { id: 'CH4', formula: 'CH4' },
        { id: 'H2', formula: 'H2' },
        { id: 'C', formula: 'C' },
      ],
      streams: [{ id: '1' }, { id: '2' }],
      units: [{ id: 'R', kind: 'reactor', balance: 'elements' }],
      links: { R: { '1': 'in', '2': 'out' } },
      reactions: [],
      givens: [],
    }
    const feed = { CH4: 160.43, H2: 0, C: 0 }
    const right = { CH4: 0, H2: 160.43 * (4.032 / 16.043), C: 160.43 * (12.011 / 16.043) }
    const good = (await calculated(small({ '1': feed, '2': right }, {}, problem))).rows
    expect(rowOf(good, 'R', 'Element H')).toMatchObject({
      in: expect.closeTo(40, 9),
      difference: expect.closeTo(0, 9),
      finding: 'closed',
    })
    expect(rowOf(good, 'R', 'CH4')).toMatchObject({
      formed: expect.closeTo(-160.43, 9),
      finding: 'by difference, no check',
    })
    expect(rowOf(good, 'R', 'Total')).toMatchObject({ finding: 'closed' })
    const wrong = (await calculated(small({ '1': feed, '2': { ...right, C: 100 } }, {}, problem))).rows
    expect(rowOf(wrong, 'R', 'Element C')).toMatchObject({ finding: 'does not close' })
    expect(rowOf(wrong, 'R', 'Element H')).toMatchObject({ finding: 'closed' })
  })
})
