import { readdirSync, readFileSync } from 'node:fs'
import { join } from 'node:path'
import { evaluate } from 'mathjs/number'
import { describe, expect, it } from 'vitest'
import { type Result, solve, toResult } from '@/lib/balance'
import { parseProblem } from '@/lib/book/problem-file'

/**
 * Worked examples from textbooks, each file with its source, its printed answers and how they are known. Tolerances
 * wider than the last digit say that the text rounds between steps.
 */
type Expected = {
  stream: string | null
  quantity: 'flow' | 'cflow' | 'massfrac' | 'molefrac' | 'extent' | 'expr'
  component?: string
  expr?: string
  value: number
  tolerance: number
}
type Case = { id: string; title: string; source: string; expected: Expected[]; book: unknown }

const folder = join(import.meta.dirname, 'cases')
const cases = readdirSync(folder).map((file) => JSON.parse(readFileSync(join(folder, file), 'utf8')) as Case)

const quantityOf = { flow: 'flow', cflow: 'componentFlow', massfrac: 'massFraction', molefrac: 'moleFraction' } as const

function readingOf(result: Result, { stream, quantity, component, expr }: Expected): number {
  const cell = (s: string, q: string, c?: string): number =>
    result.cells.find((its) => its.stream === s && its.quantity === q && its.component === c)?.value ?? Number.NaN
  if (quantity === 'extent') return result.extents.find(({ reaction }) => reaction === component)?.value ?? Number.NaN
  if (quantity !== 'expr') return cell(stream as string, quantityOf[quantity], component)
  return evaluate((expr as string).replaceAll('F(', 'total('), {
    total: (s: string) => cell(s, 'flow'),
    n: (s: string, c: string) => cell(s, 'componentFlow', c),
  }) as number
}

describe('published material balances', () => {
  it('has all cases', () => {
    expect(cases).toHaveLength(20)
  })

  for (const { id, title, source, expected, book } of cases)
    it(`${id}: ${title} (${source})`, () => {
      const parsed = parseProblem(book)
      if (!parsed.ok) throw new Error(JSON.stringify(parsed.problems))
      const result = toResult(parsed.problem, solve(parsed.problem))
      expect(result.status).toBe('solved')
      for (const item of expected) {
        const value = readingOf(result, item)
        expect(Math.abs(value - item.value), `${JSON.stringify(item)}: ${value}`).toBeLessThanOrEqual(item.tolerance)
      }
    })
})
