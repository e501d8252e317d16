import { readFileSync } from 'node:fs'
import { join } from 'node:path'
import { describe, expect, it } from 'vitest'
import { type MeasureName, type Problem, solve } from '@/lib/balance'
import { parseProblem } from '@/lib/book/problem-file'

/** Published answers that are measures of their own: a dry gas analysis, and assays of an element. Sources stand in the case files. */
type Case = { source: string; book: unknown; expected: { expr?: string; value: number; tolerance: number }[] }

const read = (id: string): Case =>
  JSON.parse(readFileSync(join(import.meta.dirname, 'cases', `${id}.json`), 'utf8')) as Case

function checked(json: unknown): Problem {
  const parsed = parseProblem(json)
  if (!parsed.ok) throw new Error(JSON.stringify(parsed.problems))
  return parsed.problem
}

describe('published answers on other bases', () => {
  it('ethane burned with excess air: dry (Orsat) analysis and water per dry gas, as printed', () => {
    const { book, expected } = read('B04_ethane_combustion_excess_air')
    const problem = checked(book)
    const dry = (component: string): MeasureName => ({ quantity: 'dryMoleFraction', component, without: ['H2O'] })
    const components = ['CO2', 'CO', 'C2H6', 'O2', 'N2']
    const { wanted } = solve(problem, [...components.map(dry), dry('H2O')])
    const stack = problem.streams.findIndex(({ id }) => id === 'stack')
    const printed = (component: string) =>
      expected.find(({ expr }) => expr?.includes(`n('stack','${component}')/(F('stack')-n('stack','H2O'))`))
    for (const [row, component] of [...components, 'H2O'].entries()) {
      const { expr, value, tolerance } = printed(component) ?? { value: Number.NaN, tolerance: 0 }
      const times = expr?.startsWith('100*') ? 100 : 1
      const found = (wanted?.values[row * problem.streams.length + stack] as number) * times
      expect(Math.abs(found - value), `${component}: ${found}`).toBeLessThanOrEqual(tolerance)
    }
  })

  it('the same flue gas from its dry analysis alone gives the printed flows back', () => {
    const problem = checked(read('B04_ethane_combustion_excess_air').book)
    const dry = (component: string, value: number) => ({
      stream: 'stack',
      quantity: 'dryMoleFraction' as const,
      component,
      without: ['H2O'],
      value,
    })
    // The printed analysis has two figures; the flows that it was rounded from: 45 CO, 135 CO2, 10 C2H6 of 2 397.5 dry.
    const given: Problem = {
      ...problem,
      relations: [],
      givens: [
        { stream: 'fuel', quantity: 'flow', value: 100 },
        { stream: 'air', quantity: 'moleFraction', component: 'O2', value: 0.21 },
        dry('CO2', 135 / 2397.5),
        dry('CO', 45 / 2397.5),
        dry('C2H6', 10 / 2397.5),
      ],
    }
    const solution = solve(given)
    expect(solution.status).toBe('solved')
    const air = problem.streams.findIndex(({ id }) => id === 'air')
    expect(solution.values[air * (2 + 4 * problem.components.length)]).toBeCloseTo(2500, 6)
  })

  it('two-product formula from copper assays of chalcopyrite in quartz: recovery and ratio of concentration as printed', () => {
    const { expected } = read('A18_two_product_copper')
    const assay = (stream: string, value: number) => ({
      stream,
      quantity: 'elementMassFraction' as const,
      element: 'Cu',
      value,
      unit: '%',
    })
    const problem = checked({
      format: 'tallybrook/1',
      name: 'Copper assays',
      basis: 'mass',
      flowUnit: 't/h',
      components: [
        { id: 'Ccp', formula: 'CuFeS2' },
        { id: 'Qz', formula: 'SiO2' },
      ],
      streams: [{ id: 'f' }, { id: 'c' }, { id: 't' }],
      units: [{ id: 'U', kind: 'separator' }],
      links: { U: { f: 'in', c: 'out', t: 'out' } },
      givens: [{ stream: 'f', quantity: 'flow', value: 1 }, assay('f', 0.8), assay('c', 25), assay('t', 0.15)],
    })
    const { values, nComponents } = solve(problem)
    const per = 2 + 4 * nComponents
    const answers: Record<string, number> = {
      "100*n('c','Cu')/n('f','Cu')": (100 * (values[per + 1] as number)) / (values[1] as number),
      "F('f')/F('c')": 1 / (values[per] as number),
    }
    const compared = expected.filter(({ expr }) => answers[expr ?? ''] !== undefined)
    expect(compared).toHaveLength(2)
    for (const { expr, value, tolerance } of compared)
      expect(Math.abs((answers[expr as string] as number) - value)).toBeLessThanOrEqual(tolerance)
  })
})
