import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { createSolver, type Given, type Problem, type Solution, solve } from '@/lib/balance'
import { generator, type RandomBookOptions, randomBook } from './random-book'

/** fast-check prints the seed and the failing case; TALLYBROOK_SEED=… draws others. */
const parameters = { numRuns: 8, verbose: 1, seed: Number(process.env.TALLYBROOK_SEED ?? 20_261_202) }

const kinds: Record<string, Omit<RandomBookOptions, 'density'>> = {
  'separators and mixers': { rules: true },
  'splitters and reactors': { rules: true, splitters: true, reactors: true },
  'sharp separations': { rules: true, splitters: true, reactors: true, sharp: true },
  'flows from 1e-3 to 1e5': { rules: true, splitters: true, reactors: true, spread: 6 },
}

/** One edit of what is typed: a value moved or set to 0, all flows scaled, a given withdrawn or put back, a rule moved. */
function edit(problem: Problem, random: () => number): Problem {
  const pick = <T>(list: readonly T[]): T => list[Math.floor(random() * list.length)] as T
  const givens = problem.givens ?? []
  const relations = problem.relations ?? []
  const what = random()
  if (what < 0.1 && relations.length > 0) {
    const rule = pick(relations)
    if (!('value' in rule) || typeof rule.value !== 'number' || rule.kind === 'extent') return problem
    const moved = { ...rule, value: rule.value * (0.8 + 0.2 * random()) }
    return { ...problem, relations: relations.map((its) => (its === rule ? moved : its)) }
  }
  if (what < 0.4) {
    const factor = 0.5 + random()
    const isFlow = ({ quantity }: Given): boolean => !quantity.endsWith('Fraction')
    return { ...problem, givens: givens.map((its) => (isFlow(its) ? { ...its, value: factor * its.value } : its)) }
  }
  if (givens.length === 0) return problem
  const given = pick(givens)
  const changed =
    what < 0.6
      ? { ...given, value: given.value * (0.9 + 0.1 * random()) }
      : what < 0.65
        ? { ...given, value: 0 }
        : { ...given, use: given.use === 'withdrawn' ? ('given' as const) : ('withdrawn' as const) }
  return { ...problem, givens: givens.map((its) => (its === given ? changed : its)) }
}

/** Values equal to a part in 1e12 of themselves or of the largest, with room for cells that lose digits by themselves. */
function agree(kept: Solution, fresh: Solution): void {
  expect(kept.status).toBe(fresh.status)
  expect(kept.summary).toEqual(fresh.summary)
  expect([...kept.states]).toEqual([...fresh.states])
  const largest = Math.max(1, ...[...fresh.values].filter(Number.isFinite).map(Math.abs))
  fresh.values.forEach((value, slot) => {
    if (Number.isNaN(value)) return
    const close = Math.abs((kept.values[slot] as number) - value) <= 1e-10 * Math.abs(value) + 1e-12 * largest
    expect(close, `slot ${slot}: ${kept.values[slot]} remembered, ${value} fresh`).toBe(true)
  })
}

describe('a solver that remembers the structure answers as a fresh one', () => {
  for (const [name, options] of Object.entries(kinds))
    it(`${name}: the same states, the same values, edit after edit`, () => {
      fc.assert(
        fc.property(fc.nat(1e9), fc.constantFrom(0.08, 0.2, 0.35), (seed, density) => {
          const random = generator(seed)
          const solver = createSolver()
          let { problem } = randomBook(seed, { ...options, density, maxUnits: 4, maxComponents: 4 })
          for (let k = 0; k < 8; k++) {
            agree(solver.solve(problem), solve(problem))
            problem = edit(problem, random)
          }
        }),
        parameters,
      )
    })
})
