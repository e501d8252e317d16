import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { solve, toResult } from '@/lib/balance'
import { problemIssues } from '@/lib/book/problem-file'
import { judgeByResidues } from './residue-oracle'
import { wideBook } from './wide-book'

/** Printed by fast-check where a run fails, with the failing book; the runs are repeated by putting it here. */
const seed = 20_240_611
const densities = [0.15, 0.3, 0.5, 0.8]

type Faults = { wrong: string[]; claimed: string[]; missed: string[]; clash: boolean; determined: number }

function faultsOf(bookSeed: number, density: number, digits: number): Faults {
  const book = wideBook(bookSeed, { density, digits })
  expect(problemIssues(book.problem)).toEqual([])
  const result = toResult(book.problem, solve(book.problem))
  const verdict = judgeByResidues(book)
  const largest = Math.max(...book.flow.map((its) => its.reduce((sum, n) => sum + n, 0)))
  const open = result.diagnostics.some(({ code }) => code === 'splitterOpen')
  const faults: Faults = { wrong: [], claimed: [], missed: [], clash: result.conflicts.length > 0, determined: 0 }
  for (const cell of result.cells) {
    const key = `${cell.stream} ${cell.quantity} ${cell.component ?? ''}`
    const truth = verdict.value.get(key) as number
    if (cell.state === 'given' || Number.isNaN(truth)) continue
    const follows = verdict.determined.get(key) === true
    // A flow of 0 that is a difference of rounded values does not follow from them.
    if (follows && (truth !== 0 || digits === 17)) {
      faults.determined++
      if (cell.state !== 'solvable' && !open) faults.missed.push(key)
    }
    if (cell.state !== 'solvable') continue
    if (!follows) faults.claimed.push(key)
    const size = Math.max(Math.abs(truth), 1e-6 * (cell.quantity.endsWith('Fraction') ? 1 : largest))
    if (!cell.flags?.includes('amplified') && !(Math.abs((cell.value as number) - truth) <= 1e-6 * size))
      faults.wrong.push(`${key}: ${cell.value}, truth ${truth}`)
  }
  return faults
}

describe('flows over six decades and more, redundant values in any order, against an oracle without tolerances', () => {
  for (const digits of [17, 12])
    it(`typed with ${digits} digits: no wrong value, none claimed that does not follow, ${digits === 17 ? 'no' : 'at most one'} clash`, () => {
      let missed = 0
      let clashes = 0
      let determined = 0
      fc.assert(
        fc.property(fc.nat(1e9), fc.constantFrom(...densities), (bookSeed, density) => {
          const faults = faultsOf(bookSeed, density, digits)
          // Where long chains blur values typed with 12 digits, a false clash is still seen in about one book of 400.
          if (digits < 17 && faults.clash) {
            clashes++
            return
          }
          expect(faults.clash).toBe(false)
          expect(faults.wrong).toEqual([])
          expect(faults.claimed).toEqual([])
          missed += faults.missed.length
          determined += faults.determined
        }),
        { numRuns: 120, verbose: 1, seed },
      )
      expect(clashes).toBeLessThanOrEqual(1)
      expect(missed).toBeLessThanOrEqual(0.005 * determined)
    })

  // Books in which the solver once failed, by seed and density: traces of a part in 1e9 taken for nothing, a blur that was
  // not carried from one composition to the next, circuits that nearly coincide.
  for (const [name, bookSeed, density, digits] of [
    ['a trace of 6e-10 in an outlet of a splitter does not vanish', 8_710_913, 0.15, 17],
    ['a ratio that rests on a small difference is flagged', 10_239_280, 0.3, 17],
    ['so is a composition drawn from one', 229_664, 0.3, 12],
    ['and one that goes round a loop', 1_971_844, 0.3, 12],
    ['two nearly equal circuits do not contradict each other by rounding', 3_120_099, 0.5, 12],
  ] as const)
    it(name, () => {
      const { wrong, claimed, clash } = faultsOf(bookSeed, density, digits)
      expect({ wrong, claimed, clash }).toEqual({ wrong: [], claimed: [], clash: false })
    })
})
