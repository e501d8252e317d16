import fc from 'fast-check'
import loadHighs from 'highs'
import { expect, it } from 'vitest'
import { solve, toResult } from '@/lib/balance'
import { leastTension } from '@/lib/balance/conflicts/least-tension'
import { type Metered, meteredPlant } from './metered-plant'
import { generator } from './random-book'

/** fast-check prints the seed and the failing case. */
const parameters = { numRuns: 150, verbose: 1, seed: 20_261_201 }
const highs = await loadHighs()

const linear = (terms: [number, string][]): string =>
  terms.map(([factor, name]) => `${factor < 0 ? '-' : '+'} ${Math.abs(factor)} ${name}`).join(' ')

/** Least t with |flow - typed| <= t x half-width for every meter, balances kept and no flow negative. */
function leastByProgramme({ rows, problem }: Metered): number {
  const lines = rows.map((row, u) => {
    const terms = row.flatMap((sign, s): [number, string][] => (sign === 0 ? [] : [[sign, `x${s + 1}`]]))
    return ` b${u}: ${linear(terms)} = 0`
  })
  problem.givens?.forEach(({ stream, value, halfWidth = 0 }, k) => {
    const flow = `x${stream.slice(1)}`
    lines.push(` u${k}: ${flow} - ${halfWidth} t <= ${value}`, ` l${k}: ${flow} + ${halfWidth} t >= ${value}`)
  })
  const solution = highs.solve(`Minimize\n obj: t\nSubject To\n${lines.join('\n')}\nEnd`)
  expect(solution.Status).toBe('Optimal')
  return solution.ObjectiveValue
}

it('the simplex method finds the same least t as HiGHS', () => {
  fc.assert(
    fc.property(fc.nat(1e9), (seed) => {
      const random = generator(seed)
      const nRows = 1 + Math.floor(random() * 4)
      const nMoves = nRows + Math.floor(random() * 6)
      const some = (): number => (random() < 0.4 ? 0 : Math.round((random() - 0.5) * 2000) / 100)
      const rows = Array.from({ length: nRows }, (_, r) =>
        Array.from({ length: nMoves }, (_, k) => (k === r ? 1 : some())),
      )
      const gaps = rows.map(() => Math.round((random() - 0.5) * 400) / 100)
      const names = Array.from({ length: nMoves }, (_, k) => `d${k}`)
      const lines = rows.map(
        (row, r) =>
          ` r${r}: ${linear(row.map((factor, k): [number, string] => [factor, `d${k}`]))} = ${-(gaps[r] as number)}`,
      )
      for (const name of names) lines.push(` u${name}: ${name} - t <= 0`, ` l${name}: ${name} + t >= 0`)
      const bounds = names.map((name) => ` ${name} free`).join('\n')
      const wanted = highs.solve(`Minimize\n obj: t\nSubject To\n${lines.join('\n')}\nBounds\n${bounds}\nEnd`)
      expect(wanted.Status).toBe('Optimal')
      const found = leastTension(rows, gaps)
      expect(found?.tension).toBeCloseTo(wanted.ObjectiveValue, 7)
      rows.forEach((row, r) => {
        const rest = row.reduce((sum, factor, k) => sum + factor * (found?.moves[k] as number), gaps[r] as number)
        expect(Math.abs(rest)).toBeLessThan(1e-8)
      })
    }),
    parameters,
  )
})

it('meters agree exactly where the linear programme says so', () => {
  const verdicts = { agree: 0, clash: 0 }
  fc.assert(
    fc.property(fc.nat(1e9), (seed) => {
      const plant = meteredPlant(seed, (flow, random) => ({
        value: flow + 5 * (random() - 0.5),
        halfWidth: 0.3 + random(),
      }))
      const least = leastByProgramme(plant)
      if (Math.abs(least - 1) < 1e-4) return
      const result = toResult(plant.problem, solve(plant.problem))
      expect(result.conflicts.length > 0, `least t ${least}`).toBe(least > 1)
      verdicts[least > 1 ? 'clash' : 'agree']++
    }),
    parameters,
  )
  expect(verdicts.agree).toBeGreaterThan(20)
  expect(verdicts.clash).toBeGreaterThan(20)
})
