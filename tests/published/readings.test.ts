import { readdirSync, readFileSync } from 'node:fs'
import { join } from 'node:path'
import { describe, expect, it } from 'vitest'
import { type Problem, type Reconciliation, reconcile } from '@/lib/balance'
import { parseProblem } from '@/lib/book/problem-file'

/** Readings that disagree, each file with its source and how its numbers are known; z values there are without sign. */
type Expected = {
  stream: string | null
  quantity: string
  component?: string
  value: number | string
  tolerance: number
}
type Case = { id: string; title: string; source: string; expected: Expected[]; book: unknown }

const folder = join(import.meta.dirname, 'readings')
const cases = readdirSync(folder).map((file) => JSON.parse(readFileSync(join(folder, file), 'utf8')) as Case)

function problemOf(book: unknown): Problem {
  const parsed = parseProblem(book)
  if (!parsed.ok) throw new Error(JSON.stringify(parsed.problems))
  return parsed.problem
}

const classes: Record<string, string> = { nonredundant: 'justDetermined' }

function readingOf(
  { summary, measures, units, suspects }: Reconciliation,
  { stream, quantity, component, value }: Expected,
) {
  const measure = measures.find(
    (its) =>
      its.stream === stream &&
      its.component === component &&
      its.quantity === (component === undefined ? 'flow' : 'massFraction'),
  )
  switch (quantity) {
    case 'flow':
      return measure?.value
    case 'class':
      return measure?.class
    case 'z_meas':
      return Math.abs(measure?.standardised as number)
    case 'z_node':
      return Math.abs(units.find(({ unit }) => unit === stream)?.standardised as number)
    case 'max_z_stream': {
      const largest = Math.max(...suspects.map(({ standardised }) => Math.abs(standardised)))
      return suspects.find((its) => Math.abs(its.standardised) === largest)?.stream === stream ? value : undefined
    }
    case 'objective':
    case 'redundancy':
      return summary[quantity]
    case 'chi2crit95':
      return summary.critical
    case 'sidak_z':
      return summary.measurementCritical
    case 'global_test_reject':
      return Number(summary.agrees === false)
    default:
      return undefined
  }
}

describe('published reconciliations', () => {
  it('has all cases', () => {
    expect(cases).toHaveLength(5)
  })

  for (const { id, title, source, expected, book } of cases)
    it(`${id}: ${title} (${source})`, () => {
      const result = reconcile(problemOf(book))
      expect(result.status).toBe('reconciled')
      for (const item of expected) {
        const found = readingOf(result, item)
        const { value, tolerance } = item
        if (typeof value === 'string') expect(found, JSON.stringify(item)).toBe(classes[value] ?? value)
        else
          expect(Math.abs((found as number) - value), `${JSON.stringify(item)}: ${found}`).toBeLessThanOrEqual(
            tolerance,
          )
      }
    })

  it('carries the uncertainty of assays to a yield (law of propagation, JCGM 100 5.1.2)', () => {
    const assay = (stream: string, value: number, sigma: number) => ({
      stream,
      quantity: 'massFraction',
      component: 'M',
      value,
      sigma,
      unit: '%',
    })
    const result = reconcile(
      problemOf({
        format: 'tallybrook/1',
        name: 'two products',
        basis: 'mass',
        flowUnit: 't/h',
        components: [{ id: 'M' }, { id: 'G' }],
        streams: [{ id: 'f' }, { id: 'c' }, { id: 't' }],
        units: [{ id: 'U', kind: 'separator' }],
        links: { U: { f: 'in', c: 'out', t: 'out' } },
        givens: [
          { stream: 'f', quantity: 'flow', value: 1 },
          assay('f', 0.8, 0.016),
          assay('c', 25, 0.5),
          assay('t', 0.15, 0.003),
        ],
      }),
    )
    // Y = (f - t)/(c - t) and its partial derivatives, by hand.
    const [f, c, t] = [0.8, 25, 0.15]
    const byHand = Math.hypot(0.016 / (c - t), (0.5 * (f - t)) / (c - t) ** 2, (0.003 * (f - c)) / (c - t) ** 2)
    const yieldOfProduct = result.measures.find(({ stream, quantity }) => stream === 'c' && quantity === 'flow')
    expect(yieldOfProduct?.value).toBeCloseTo(0.0261569, 7)
    expect(yieldOfProduct?.standardDeviation).toBeCloseTo(byHand, 9)
    expect(yieldOfProduct?.standardDeviation).toBeCloseTo(0.00083, 4)
  })
})

describe('demo-e-whey, an invented plant with one planted fault', () => {
  const book = JSON.parse(readFileSync(join(import.meta.dirname, '../fixtures/demo/demo-e-whey.book.json'), 'utf8'))
  const result = reconcile(problemOf(book))

  it('does not hang together: 57.97 against 24.98 at 15 degrees of freedom', () => {
    expect(result.summary).toMatchObject({ readings: 36, redundancy: 15, agrees: false, boundsActive: 0 })
    expect(result.summary.objective).toBeCloseTo(57.97, 2)
    expect(result.summary.critical).toBeCloseTo(24.996, 2)
    expect(result.summary.measurementCritical).toBeCloseTo(3.19, 2)
  })

  it('points at meter 505, without which it does', () => {
    const [first] = result.suspects
    expect(first).toMatchObject({ stream: '505', quantity: 'flow', group: 1 })
    expect(first?.standardised).toBeCloseTo(-6.32, 2)
    expect(first?.objectiveWithout).toBeCloseTo(18.09, 2)
    expect(first?.criticalWithout).toBeCloseTo(23.68, 2)
    expect(Math.round(first?.estimate as number)).toBe(34307)
  })

  it('gives the totals of the plant without that meter', () => {
    const without = {
      ...book,
      givens: book.givens.map((given: { stream: string; quantity: string }) =>
        given.stream === '505' && given.quantity === 'flow' ? { ...given, use: 'withdrawn' } : given,
      ),
    }
    const again = reconcile(problemOf(without))
    expect(again.summary.agrees).toBe(true)
    const demo = JSON.parse(readFileSync(join(import.meta.dirname, '../fixtures/demo/demo-e-whey.json'), 'utf8'))
    const totals = demo.reconciliation_expected.reconciled_totals as Record<string, number>
    for (const [stream, value] of Object.entries(totals)) {
      const found = again.measures.find((its) => its.stream === stream && its.quantity === 'flow')?.value as number
      expect(Math.abs(found - value), stream).toBeLessThanOrEqual(5e-6 * value)
    }
  })
})
