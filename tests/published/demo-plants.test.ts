import { readFileSync } from 'node:fs'
import { join } from 'node:path'
import { describe, expect, it } from 'vitest'
import { type Problem, type Result, solve, toResult } from '@/lib/balance'
import { parseProblem } from '@/lib/book/problem-file'

/** The invented plants of the seed, each with a solution worked out apart from this solver. */
const read = (name: string): unknown =>
  JSON.parse(readFileSync(join(import.meta.dirname, '../fixtures/demo', name), 'utf8'))

type Solution = {
  total: Record<string, number>
  component_flow: Record<string, Record<string, number>>
  fraction: Record<string, Record<string, number>>
}

function problemOf(name: string): Problem {
  const parsed = parseProblem(read(`${name}.book.json`))
  if (!parsed.ok) throw new Error(JSON.stringify(parsed.problems))
  return parsed.problem
}
const resultOf = (problem: Problem): Result => toResult(problem, solve(problem))

describe('demo plants', () => {
  it.each(['demo-a-salt', 'demo-b-citrus', 'demo-c-blackmass', 'demo-d-biogas'])(
    '%s agrees with its solution in every cell',
    (name) => {
      const problem = problemOf(name)
      const { solution } = read(`${name}.json`) as { solution: Solution }
      const result = resultOf(problem)
      expect(result.status).toBe('solved')
      const largest = Math.max(...Object.values(solution.total))
      const own = `${problem.basis}Fraction`
      let compared = 0
      for (const { stream, quantity, component = '', value } of result.cells) {
        const wanted =
          quantity === 'flow'
            ? solution.total[stream]
            : quantity === 'componentFlow'
              ? (solution.component_flow[stream]?.[component] ?? 0)
              : quantity === own
                ? (solution.fraction[stream]?.[component] ?? 0)
                : undefined
        if (wanted === undefined) continue
        compared++
        const allowed = 1e-6 * Math.max(Math.abs(wanted), 1e-6 * (quantity === own ? 1 : largest))
        expect(Math.abs((value as number) - wanted), `${stream} ${quantity} ${component}`).toBeLessThanOrEqual(allowed)
      }
      expect(compared).toBe(result.summary.given + result.summary.solvable)
    },
  )

  it('demo-e-whey loads, is over-measured, and names sets of its meters', () => {
    const result = resultOf(problemOf('demo-e-whey'))
    expect(result.status).toBe('atOdds')
    expect(result.conflicts.length).toBeGreaterThan(1)
    const evaporator = result.conflicts.find(({ boundary }) => boundary.join() === 'EV-54,TK-55')
    expect(evaporator?.givens.map(({ stream, by }) => [stream, Math.round(by)])).toEqual([
      ['507', 28],
      ['509', -28],
      ['512', -28],
      ['511', -28],
    ])
  })

  it('the salt plant with a belt weigher of 10,900 on 112 is at odds by +284.19, in one minimal set', () => {
    const problem = problemOf('demo-a-salt')
    problem.givens?.push({ stream: '112', quantity: 'flow', value: 10_900 })
    const result = resultOf(problem)
    expect(result.conflicts).toHaveLength(1)
    const [conflict] = result.conflicts
    const weigher = conflict?.givens.find(({ quantity, stream }) => stream === '112' && quantity === 'flow')
    expect(weigher?.by).toBeCloseTo(284.19, 2)
    // The condensate meter and the split of the liquor drop out of the overall balances of the salts.
    expect(conflict?.relations).toEqual([])
    expect(conflict?.givens).toHaveLength(11)
    expect(conflict?.givens.some(({ stream }) => stream === '103')).toBe(false)
    expect(result.cells.find(({ stream, quantity }) => stream === '103' && quantity === 'flow')?.state).toBe('given')
  })

  it('the salt plant without its feed total: nothing that hangs on it keeps a value', () => {
    const problem = problemOf('demo-a-salt')
    const full = resultOf(problem)
    const result = resultOf({
      ...problem,
      givens: (problem.givens ?? []).filter(({ stream, quantity }) => stream !== '101' || quantity !== 'flow'),
    })
    expect(result.status).toBe('open')
    expect(result.summary.unknown).toBeGreaterThan(20)
    for (const [k, cell] of result.cells.entries())
      if (cell.value !== undefined) expect(cell.value).toBeCloseTo(full.cells[k]?.value as number, 9)
  })
})
