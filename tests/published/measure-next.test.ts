import { readFileSync } from 'node:fs'
import { join } from 'node:path'
import { describe, expect, it } from 'vitest'
import { type Given, measureNext, type Place, type Problem, type Rule, solve, toResult } from '@/lib/balance'
import { parseProblem } from '@/lib/book/problem-file'

/** The invented plants of the seed: which streams open up without one of their values was worked out apart from this solver. */
type Demo = {
  drop_one_given: { removed: string; streams_affected: string[] }[]
  solution: {
    total: Record<string, number>
    component_flow: Record<string, Record<string, number>>
    fraction: Record<string, Record<string, number>>
  }
}

const read = (name: string): unknown =>
  JSON.parse(readFileSync(join(import.meta.dirname, '../fixtures/demo', name), 'utf8'))

function problemOf(name: string): Problem {
  const parsed = parseProblem(read(`${name}.book.json`))
  if (!parsed.ok) throw new Error(JSON.stringify(parsed.problems))
  return parsed.problem
}

const labelOf = ({ stream, quantity, component }: Given): string =>
  quantity === 'flow' ? `${stream} total flow` : `${stream} fraction of ${component}`

/** The book without what a label names; a composition or share that was typed for several streams goes from all. */
function without(problem: Problem, removed: string): Problem {
  const isSplit = removed.startsWith('split ')
  const relations = (problem.relations ?? []).filter((rule: Rule) => !(isSplit && rule.kind === 'split'))
  const givens = (problem.givens ?? []).filter((given) => labelOf(given) !== removed)
  expect(givens.length + relations.length, removed).toBe(
    (problem.givens?.length ?? 0) + (problem.relations?.length ?? 0) - 1,
  )
  return { ...problem, givens, relations }
}

const unknownStreams = (problem: Problem): string[] => {
  const { cells } = toResult(problem, solve(problem))
  const own = ['flow', 'componentFlow', `${problem.basis}Fraction`]
  const open = cells.filter(({ state, quantity }) => state === 'unknown' && own.includes(quantity))
  return [...new Set(open.map(({ stream }) => stream))].sort()
}

describe.each(['demo-a-salt', 'demo-b-citrus', 'demo-c-blackmass', 'demo-d-biogas'])('%s', (name) => {
  const problem = problemOf(name)
  const { drop_one_given, solution } = read(`${name}.json`) as Demo
  const truth = ({ stream, quantity, component = '' }: Place): number =>
    quantity === 'flow'
      ? (solution.total[stream] as number)
      : ((quantity === 'componentFlow' ? solution.component_flow : solution.fraction)[stream]?.[component] ?? 0)
  it.each(drop_one_given.map((line) => [line.removed, line] as const))(
    'without %s',
    (removed, { streams_affected }) => {
      const open = without(problem, removed)
      expect(unknownStreams(open)).toEqual([...streams_affected].sort())
      const next = measureNext(open)
      const [best] = next
      expect(best?.leaves).toBe(0)
      const real = next.filter(({ set }) => set.every((place) => truth(place) > 0))
      expect(real.length).toBeGreaterThan(0)
      for (const { set, leaves } of real.slice(0, 8)) {
        const solved = solve({
          ...open,
          givens: [...(open.givens ?? []), ...set.map((place) => ({ ...place, value: truth(place) }))],
        })
        expect(solved.summary.unknown, JSON.stringify(set)).toBe(leaves)
      }
    },
  )

  it('with nothing given: a small set closes it once its true values are typed', () => {
    const open = { ...problem, givens: [] }
    const [best] = measureNext(open)
    expect(best?.leaves).toBe(0)
    const given = (best?.set ?? []).filter((place) => truth(place) > 0)
    const typed = given.map((place) => ({ ...place, value: truth(place) }))
    const { conflicts, summary } = solve({ ...open, givens: typed })
    expect(conflicts).toEqual([])
    if (given.length === best?.set.length) expect(summary.unknown).toBe(0)
    expect(best?.set.length).toBe(solve(open).summary.degreesOfFreedom)
  })
})
