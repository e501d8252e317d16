import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { type Result, solve, toResult } from '@/lib/balance'
import { problemIssues } from '@/lib/book/problem-file'
import { notLinearBook } from './not-linear-book'
import { NotLinearOracle } from './not-linear-oracle'

/** The same books on every run; TALLYBROOK_SEED=… draws others. fast-check prints the seed and the failing case. */
const parameters = { numRuns: 40, verbose: 1, seed: Number(process.env.TALLYBROOK_SEED ?? 20_261_201) }
const densities = [0.1, 0.2, 0.3, 0.45]
/** Part of the cells that follow at the truth, and of which no second value was found, that may be missed. */
const MISSED = 0.005
/** Codes that say that some rule was not, or not surely, used. */
const doubts = ['splitterOpen', 'ruleNotUsed', 'severalRoots', 'localOnly', 'noRoot', 'rootsStopped']

const keyOf = ({ stream, quantity, component }: Pick<Result['cells'][number], 'stream' | 'quantity' | 'component'>) =>
  `${stream} ${quantity} ${component ?? ''}`
const apart = (a: number, b: number): boolean => Math.abs(a - b) > 1e-6 * Math.max(Math.abs(b), 1e-9)

describe('random books with withheld splits, free parameters and formulas, against a dense oracle', () => {
  it('no wrong value, none claimed that does not follow or has another value elsewhere, at most 0.5 % missed', () => {
    let determined = 0
    let missed = 0
    fc.assert(
      fc.property(fc.nat(1e9), fc.constantFrom(...densities), (seed, density) => {
        const book = notLinearBook(seed, density)
        fc.pre(book.flow.every((its) => its.every((n) => n > 0)))
        expect(problemIssues(book.problem)).toEqual([])
        const result = toResult(book.problem, solve(book.problem))
        const codes = result.diagnostics.map(({ code }) => code)
        expect(result.conflicts).toEqual([])
        expect(codes).not.toContain('noRoot')
        const oracle = new NotLinearOracle(book)
        const follows = oracle.locallyDetermined()
        const inDoubt = codes.some((code) => doubts.includes(code))
        let others: number[][] | undefined
        const second = (key: string): boolean => {
          others ??= inDoubt ? oracle.solutions(10, seed) : []
          const { read, value } = oracle.cell(key)
          return others.some((x) => apart(read(x), value))
        }
        for (const cell of result.cells) {
          const key = keyOf(cell)
          if (cell.state === 'given') continue
          if (follows.has(key)) determined++
          if (cell.state === 'solvable') {
            const truth = oracle.cell(key).value
            if (!cell.flags?.includes('amplified'))
              expect(apart(cell.value as number, truth), `${key}: ${cell.value}, truth ${truth}`).toBe(false)
            expect(follows.has(key), `${key} does not follow`).toBe(true)
            expect(second(key), `${key} has another value in another solution`).toBe(false)
          } else if (follows.has(key) && !result.roots?.cells.some((its) => keyOf(its) === key) && !second(key))
            missed++
        }
        for (const cell of result.roots?.cells ?? []) {
          const { value } = oracle.cell(keyOf(cell))
          expect(cell.values.length).toBeGreaterThan(0)
          expect(
            cell.values.some((its) => !apart(its, value)),
            `${keyOf(cell)}: the truth ${value} is among ${cell.values}`,
          ).toBe(true)
        }
        if (!codes.includes('rootsStopped')) expect(result.summary.degreesOfFreedom).toBe(oracle.freedom)
      }),
      parameters,
    )
    expect(missed / determined).toBeLessThanOrEqual(MISSED)
  })
})
