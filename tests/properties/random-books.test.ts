import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { type Problem, type Result, solve, toResult } from '@/lib/balance'
import { problemIssues } from '@/lib/book/problem-file'
import { judge } from './dense-oracle'
import { generator, type RandomBookOptions, randomBook } from './random-book'

/** The same books on every run; TALLYBROOK_SEED=… draws others. fast-check prints the seed and the failing case. */
const parameters = { numRuns: 120, verbose: 1, seed: Number(process.env.TALLYBROOK_SEED ?? 20_261_201) }
const densities = [0.08, 0.2, 0.35, 0.5, 0.8]

const kinds: Record<string, Omit<RandomBookOptions, 'density'>> = {
  'separators and mixers': { rules: true },
  'splitters and reactors': { rules: true, splitters: true, reactors: true },
  'sharp separations, flows of exactly 0': { rules: true, splitters: true, reactors: true, sharp: true },
  'flows from 1e-3 to 1e5 with redundant values': { rules: true, splitters: true, reactors: true, spread: 6 },
}

const resultOf = (problem: Problem): Result => toResult(problem, solve(problem))
const keyOf = ({ stream, quantity, component }: Result['cells'][number]): string =>
  `${stream} ${quantity} ${component ?? ''}`

describe('random books with a hidden truth, against a dense oracle', () => {
  for (const [name, options] of Object.entries(kinds))
    it(`${name}: no wrong value, none claimed that does not follow, none missed, no false clash`, () => {
      fc.assert(
        fc.property(fc.nat(1e9), fc.constantFrom(...densities), (seed, density) => {
          const book = randomBook(seed, { ...options, density })
          expect(problemIssues(book.problem)).toEqual([])
          const result = resultOf(book.problem)
          expect(result.conflicts).toEqual([])
          const verdict = judge(book)
          const largest = Math.max(...book.flow.map((its) => its.reduce((sum, n) => sum + n, 0)))
          const unresolved = result.diagnostics.some(({ code }) => code === 'splitterOpen')
          for (const cell of result.cells) {
            const key = keyOf(cell)
            const truth = verdict.value.get(key) as number
            if (cell.state === 'given' || Number.isNaN(truth) || cell.flags?.includes('amplified')) continue
            if (cell.state === 'solvable') {
              const scale = cell.quantity.endsWith('Fraction') ? 1 : largest
              const close = Math.abs((cell.value as number) - truth) <= 1e-6 * Math.max(Math.abs(truth), 1e-9 * scale)
              expect(close, `${key}: ${cell.value}, truth ${truth}`).toBe(true)
            }
            // With flows over eight powers of ten the oracle itself is unsure of what moves by a part in 1e7.
            if (options.spread || truth === 0) continue
            // Where whole fractions are 0 or 1, the solver finds zeros by the sign rule that the oracle does not look for.
            if (cell.state === 'solvable') {
              if (!options.sharp) expect(verdict.determined.get(key), `${key} does not follow`).toBe(true)
            } else if (!unresolved) expect(verdict.determined.get(key), `${key} was missed`).toBe(false)
          }
          // A splitter left open is not counted yet as the oracle counts it.
          if (!options.spread && !options.sharp && !unresolved)
            expect(result.summary.degreesOfFreedom).toBe(verdict.freedom)
        }),
        parameters,
      )
    })
})

describe('what must not matter', () => {
  const options = { rules: true, splitters: true, reactors: true }

  it('the order in which streams, components, units, givens and rules are typed', () => {
    fc.assert(
      fc.property(fc.nat(1e9), fc.constantFrom(...densities), (seed, density) => {
        const { problem } = randomBook(seed, { ...options, density })
        const before = statesOf(resultOf(problem))
        const after = statesOf(resultOf(shuffled(problem, seed)))
        expect([...after.keys()].sort()).toEqual([...before.keys()].sort())
        for (const [key, cell] of before) expectSame(key, cell, after.get(key) as Result['cells'][number], 1)
      }),
      parameters,
    )
  })

  it('the scale of the flows: all flows times 1000 gives all flows times 1000', () => {
    fc.assert(
      fc.property(fc.nat(1e9), fc.constantFrom(...densities), (seed, density) => {
        const { problem } = randomBook(seed, { ...options, density })
        const before = statesOf(resultOf(problem))
        const after = statesOf(resultOf(scaled(problem, 1000)))
        for (const [key, cell] of before)
          expectSame(
            key,
            cell,
            after.get(key) as Result['cells'][number],
            cell.quantity.endsWith('Fraction') ? 1 : 1000,
          )
      }),
      parameters,
    )
  })
})

const statesOf = (result: Result): Map<string, Result['cells'][number]> =>
  new Map(result.cells.map((cell) => [keyOf(cell), cell]))

function expectSame(key: string, a: Result['cells'][number], b: Result['cells'][number], factor: number): void {
  expect(b.state, key).toBe(a.state)
  if (a.value === undefined || a.flags?.includes('amplified')) return
  const gap = Math.abs((b.value as number) - a.value * factor)
  expect(gap <= 1e-8 * Math.max(Math.abs(a.value * factor), 1e-6 * factor), `${key}: ${a.value}, ${b.value}`).toBe(true)
}

function shuffled(problem: Problem, seed: number): Problem {
  const random = generator(seed)
  const mixed = <T>(list: T[]): T[] =>
    list
      .map((item) => ({ item, at: random() }))
      .sort((a, b) => a.at - b.at)
      .map(({ item }) => item)
  return {
    ...problem,
    components: mixed(problem.components),
    streams: mixed(problem.streams.map((stream) => ({ ...stream, components: mixed(stream.components ?? []) }))),
    units: mixed(problem.units),
    links: Object.fromEntries(
      mixed(Object.entries(problem.links)).map(([unit, its]) => [unit, Object.fromEntries(mixed(Object.entries(its)))]),
    ),
    reactions: mixed(problem.reactions ?? []),
    givens: mixed(problem.givens ?? []),
    relations: mixed(problem.relations ?? []),
  }
}

function scaled(problem: Problem, factor: number): Problem {
  return {
    ...problem,
    givens: (problem.givens ?? []).map((given) =>
      given.quantity.endsWith('Fraction') ? given : { ...given, value: given.value * factor },
    ),
    relations: (problem.relations ?? []).map((rule) =>
      rule.kind === 'extent' ? { ...rule, value: (rule.value as number) * factor } : rule,
    ),
  }
}
