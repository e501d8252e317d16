import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { type MeasureNext, measureNext, type Place, type Problem, solve } from '@/lib/balance'
import { generator, type RandomBook, type RandomBookOptions, randomBook } from './random-book'

const parameters = { numRuns: 40, verbose: 1, seed: Number(process.env.TALLYBROOK_SEED ?? 20_261_202) }

const kinds: Record<string, Omit<RandomBookOptions, 'density'>> = {
  'separators, mixers and rules': { rules: true },
  'splitters that may stay open, reactors': { rules: true, splitters: true, reactors: true },
}

/** The hidden truth at a place. */
function truthAt({ problem, flow }: RandomBook, { stream, quantity, component }: Place): number {
  const its = flow[problem.streams.findIndex(({ id }) => id === stream)] as number[]
  const total = its.reduce((sum, n) => sum + n, 0)
  if (component === undefined) return total
  const n = its[problem.components.findIndex(({ id }) => id === component)] as number
  return quantity === 'componentFlow' ? n : n / total
}

const withTruth = (book: RandomBook, set: readonly Place[]): Problem => ({
  ...book.problem,
  givens: [...(book.problem.givens ?? []), ...set.map((place) => ({ ...place, value: truthAt(book, place) }))],
})

/** Whether everything that can be present is: a flow of 0 can settle more than its neighbours could foresee. */
const isGeneric = ({ problem, flow }: RandomBook): boolean =>
  problem.streams.every(({ components }, s) =>
    problem.components.every(({ id }, c) => components?.includes(id) === false || (flow[s]?.[c] as number) > 0),
  )

const isReal = (book: RandomBook, { set }: MeasureNext): boolean => set.every((place) => truthAt(book, place) > 0)

describe('what to measure next, on random books with values withheld', () => {
  for (const [name, options] of Object.entries(kinds))
    it(`${name}: each candidate settles what it says, the closing set closes and none of it is redundant`, () => {
      let candidates = 0
      let sets = 0
      let open = 0
      let several = 0
      fc.assert(
        fc.property(fc.nat(1e9), fc.constantFrom(0.1, 0.25, 0.4), (seed, density) => {
          const book = randomBook(seed, { ...options, density })
          const { summary, diagnostics } = solve(book.problem)
          const before = summary.unknown
          const isLeftOpen = diagnostics.some(({ code }) => code === 'splitterOpen')
          const next = measureNext(book.problem)
          if (before > 0 && isGeneric(book)) open++
          const random = generator(seed)
          for (const candidate of next) {
            expect(candidate.settles + candidate.leaves).toBe(before)
            if (!isReal(book, candidate) || (candidate.set.length === 1 && random() > 0.3)) continue
            const after = solve(withTruth(book, candidate.set))
            expect(after.conflicts, JSON.stringify(candidate)).toEqual([])
            // Whether rules that multiply unknowns can be met in one way or in several hangs on the value itself.
            if (isLeftOpen && after.summary.unknown > candidate.leaves) {
              several++
              continue
            }
            expect(after.summary.unknown, JSON.stringify(candidate)).toBeLessThanOrEqual(candidate.leaves)
            // A rule that multiplies unknowns may be met in one way at this value: more is known then than was promised.
            if (!isGeneric(book) || isLeftOpen) continue
            expect(after.summary.unknown, JSON.stringify(candidate)).toBe(candidate.leaves)
            candidates++
          }
          const closing = next[0]
          if (!closing || closing.leaves > 0 || !isReal(book, closing) || !isGeneric(book)) return
          sets++
          if (closing.set.length > 1 && !isLeftOpen)
            for (const place of closing.set) {
              const without = closing.set.filter((other) => other !== place)
              expect(solve(withTruth(book, without)).summary.unknown, JSON.stringify(place)).toBeGreaterThan(0)
            }
        }),
        parameters,
      )
      expect(candidates).toBeGreaterThan(200)
      expect(several).toBeLessThan(0.01 * candidates)
      expect(sets).toBeGreaterThan(0.8 * open)
    })
})
