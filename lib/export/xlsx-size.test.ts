import { describe, expect, it } from 'vitest'
import type { Problem } from '@/lib/balance/problem'
import { calculated, rowOf } from '@/tests/closure-sheet'
import { exportCase, smallProblem, workbookOf } from '@/tests/export-case'
import { handSolution } from '@/tests/hand-solution'
import { cellsOf, readWorkbook, rowStarting, sheetOf } from '@/tests/workbook'

describe('size', () => {
  /** A header into which `n` streams run, one out: sums longer than a formula may be. */
  const header = (n: number): Problem => ({
    ...smallProblem,
    streams: Array.from({ length: n + 1 }, (_, s) => ({ id: String(s) })),
    units: [{ id: 'H', kind: 'mixer' }],
    links: { H: Object.fromEntries(Array.from({ length: n + 1 }, (_, s) => [String(s), s < n ? 'in' : 'out'])) },
    reactions: [],
    givens: [],
  })

  it('gathers sums that are too long for one formula', async () => {
    const n = 430
    const flows = Object.fromEntries(
      Array.from({ length: n + 1 }, (_, s) => [String(s), s < n ? { A: s, B: 1 } : { A: (n * (n - 1)) / 2, B: n }]),
    )
    const problem = header(n)
    const full = await calculated(exportCase(problem, (taken) => handSolution(taken, flows)))
    for (const [, { f = '' }] of cellsOf(sheetOf(full.workbook, 'Closure'))) {
      expect(f.length).toBeLessThan(8192)
      for (const [list] of f.matchAll(/\([^()]*\)/g)) expect(list.split(',').length).toBeLessThanOrEqual(255)
    }
    expect(rowOf(full.rows, 'H', 'Acid (A)')).toMatchObject({ in: (n * (n - 1)) / 2, difference: 0, finding: 'closed' })
    const { '7': _, '300': __, ...less } = flows
    const some = await calculated(exportCase(problem, (taken) => handSolution(taken, less)))
    expect(rowOf(some.rows, 'H', 'Acid (A)')).toMatchObject({ in: 'unknown', difference: 'not closed: 2 unknown' })
  })

  it('writes 300 streams of 30 components', async () => {
    const components = Array.from({ length: 30 }, (_, c) => ({
      id: `C${c}`,
      name: `Component ${c}`,
      molarMass: 20 + c,
    }))
    const streams = Array.from({ length: 301 }, (_, s) => ({ id: String(100 + s) }))
    const units = Array.from({ length: 100 }, (_, u) => ({ id: `U${u}`, kind: 'mixer' as const }))
    const ends = (u: number) => [3 * u, 3 * u + 1, 3 * u + 2].map((s) => [String(100 + s), 'in'])
    const links = Object.fromEntries(
      units.map(({ id }, u) => [id, Object.fromEntries([...ends(u), [String(103 + 3 * u), 'out']])]),
    )
    const problem: Problem = { ...smallProblem, components, streams, units, links, reactions: [], givens: [] }
    const flows = Object.fromEntries(
      streams.map(({ id }) => [id, Object.fromEntries(components.map((c, at) => [c.id, at + 1]))]),
    )
    const input = exportCase(problem, (taken) => handSolution(taken, flows))
    const workbook = readWorkbook(await workbookOf(input))
    expect(rowStarting(sheetOf(workbook, 'Stream table'), 'Total flow').values).toHaveLength(303)
  })
})
