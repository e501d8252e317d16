import fc from 'fast-check'
import loadHighs from 'highs'
import { describe, expect, it } from 'vitest'
import { CellState, limitsOf, type Place, slotOf, solve, solveLpBy } from '@/lib/balance'
import { type RandomBookOptions, randomBook } from './random-book'

const parameters = { numRuns: 30, verbose: 1, seed: Number(process.env.TALLYBROOK_SEED ?? 20_261_203) }
const solveLp = solveLpBy(await loadHighs())

const kinds: Record<string, Omit<RandomBookOptions, 'density'>> = {
  'separators, mixers and rules': { rules: true },
  'splitters that may stay open, reactors, three decades': { rules: true, splitters: true, reactors: true, spread: 3 },
}

describe('limits of unknown cells, on random books with values withheld', () => {
  for (const [name, options] of Object.entries(kinds))
    it(`${name}: the truth lies within, and beyond an end that is reached a flow would be negative`, () => {
      let [cells, upper, ends] = [0, 0, 0]
      fc.assert(
        fc.property(fc.nat(1e9), fc.constantFrom(0.15, 0.3, 0.45), (seed, density) => {
          const { problem, flow } = randomBook(seed, { ...options, density })
          const solution = solve(problem)
          if (solution.conflicts.length > 0) return
          let tried = 0
          problem.streams.forEach(({ id: stream }, s) => {
            const its = flow[s] as number[]
            const total = its.reduce((sum, n) => sum + n, 0)
            const places: [Place, number, number][] = [
              [{ stream, quantity: 'flow' }, slotOf(solution.nComponents, s, 'flow'), total],
              ...problem.components.flatMap(({ id: component }, c): [Place, number, number][] => [
                [
                  { stream, quantity: 'componentFlow', component },
                  slotOf(solution.nComponents, s, 'componentFlow', c),
                  its[c] as number,
                ],
                [
                  { stream, quantity: problem.basis === 'mass' ? 'massFraction' : 'moleFraction', component },
                  slotOf(solution.nComponents, s, 'fraction', c),
                  (its[c] as number) / total,
                ],
              ]),
            ]
            for (const [place, slot, truth] of places) {
              if (solution.states[slot] !== CellState.unknown || !Number.isFinite(truth) || tried++ > 12) continue
              const found = limitsOf(problem, solution, place, solveLp)
              const where = `${seed} ${JSON.stringify(place)} ${truth} ${JSON.stringify(found)}`
              if (!found.found) throw new Error(where)
              const { least, greatest } = found
              const room = 1e-6 * Math.max(1, Math.abs(truth))
              cells++
              expect(least.value, where).not.toBe(null)
              expect((least.value as number) - room, where).toBeLessThanOrEqual(truth)
              expect(least.value as number, where).toBeGreaterThanOrEqual(-room)
              if (greatest.value === null) continue
              upper++
              expect(greatest.value + room, where).toBeGreaterThanOrEqual(truth)
              if (found.atLeastAsWide || !greatest.isReached || place.quantity !== 'flow') continue
              ends++
              const end = greatest.value
              const then = (value: number) => {
                const book = { ...problem, givens: [...(problem.givens ?? []), { ...place, value }] }
                return limitsOf(book, solve(book), place, solveLp)
              }
              expect(then(truth + 0.9 * (end - truth)), `inside ${where}`).toMatchObject({ found: true })
              expect(then(end + 0.05 * (end + 1)), `beyond ${where}`).toMatchObject({ found: false })
            }
          })
        }),
        parameters,
      )
      expect([cells > 100, upper > 30, ends > 5], `${cells} cells, ${upper} with an upper limit, ${ends} ends`).toEqual(
        [true, true, true],
      )
    })
})
