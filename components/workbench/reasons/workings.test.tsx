import { readFileSync } from 'node:fs'
import { join } from 'node:path'
import { screen, within } from '@testing-library/react'
import { describe, expect, it } from 'vitest'
import { demoRecords, openBench } from '../test-bench'

const plain = (text: string | null | undefined) => (text ?? '').replace(/\s+/g, ' ').trim()

type Sheet = { total: Record<string, number>; component_flow: Record<string, Record<string, number>> }
const sheetOf = (name: string): Sheet =>
  JSON.parse(readFileSync(join(import.meta.dirname, `../../../tests/fixtures/demo/${name}.json`), 'utf8')).solution

async function open(records = demoRecords('demo-a-salt')) {
  const bench = openBench({ records })
  await bench.user.click(screen.getByRole('tab', { name: /Workings/ }))
  const list = () => within(screen.getByRole('list', { name: 'Workings' }))
  const steps = () =>
    list()
      .getAllByRole('heading')
      .map(({ textContent }) => plain(textContent))
  const step = (title: RegExp) => {
    const found = list().getByRole('heading', { name: title }).closest('li')
    if (!found) throw new Error(`There is no step ${title}`)
    return found
  }
  const equations = (title: RegExp) =>
    [...step(title).querySelectorAll('[aria-label^="Equations"] tbody tr')].map((row) => [
      plain(row.querySelector('th')?.textContent),
      plain(row.querySelector('td > span:last-child')?.textContent),
    ])
  return { ...bench, list, steps, step, equations }
}

/** Reads "12 000.0 = NaCl(107) + 0.2300 × F(108)" and puts numbers for the names. */
function sides(equation: string, values: Record<string, number>): number[] {
  return equation.split(' = ').map((side) => {
    const terms = side
      .replace(/(\d) (?=\d{3})/g, '$1')
      .replace(/ − /g, ' + −')
      .split(' + ')
    return terms.reduce((sum, term) => {
      const factors = term.split(' × ').map((factor) => {
        const value = values[factor.replace('−', '')] ?? Number(factor.replace('−', ''))
        expect(value, `“${factor}” in “${equation}”`).not.toBeNaN()
        return factor.startsWith('−') ? -value : value
      })
      return sum + factors.reduce((product, factor) => product * factor, 1)
    }, 0)
  })
}

describe('the workings of the salt plant', () => {
  it('go from streams alone to the boundary round four units, and on to the product', async () => {
    const { steps, step } = await open()
    expect(steps()[0]).toMatch(/^Step 1: Stream 101 alone/)
    expect(steps().some((title) => title.includes('Boundary round T-101, E-102, C-103 and S-104'))).toBe(true)
    const joined = plain(step(/Boundary round T-101/).textContent)
    expect(joined).toContain('6 streams cross it: 101, 103, 105, 107, 108 and 109.')
    expect(joined).toContain('6 values are unknown in the equations used, and there are 6 equations')
    expect(joined).toContain('107Total flow, kg/h10 939')
    expect(plain(step(/Round D-106/).textContent)).toContain('112Total flow, kg/h10 616')
  })

  it('print equations that the results satisfy, with the numbers known before the step put in', async () => {
    const { equations } = await open()
    const found = Object.fromEntries(equations(/Boundary round T-101/))
    expect(found.total).toBe('50 000.0 + F(109) = 8 000.0 + F(105) + F(107) + F(108)')
    expect(found.NaCl).toBe('12 000.0 + 0.2300 × F(109) = NaCl(107) + 0.2300 × F(108)')
    // The values of the demo's own sheet, which this solver has not made.
    const { total, component_flow: parts } = sheetOf('demo-a-salt')
    const values = Object.fromEntries([
      ...Object.entries(total).map(([stream, value]) => [`F(${stream})`, value]),
      ...Object.entries(parts).flatMap(([stream, flows]) =>
        Object.entries(flows).map(([component, value]) => [`${component}(${stream})`, value]),
      ),
    ])
    for (const name of ['total', 'NaCl', 'MgCl2', 'KCl', 'sum of 107']) {
      const [left, right] = sides(found[name] ?? '', values) as [number, number]
      expect(Math.abs(left - right) / Math.abs(left), `${name}: ${found[name]}`).toBeLessThan(2e-4)
    }
  })

  it('lead to the cells that they lean on', async () => {
    const { user, step, focused } = await open()
    await user.click(within(step(/Boundary round T-101/)).getByRole('button', { name: 'total flow of 103' }))
    await new Promise((done) => setTimeout(done, 100))
    expect(focused()).toMatch(/^Total flow, stream 103/)
  })

  it('are walked through: found before, solvable now, still unknown; the boundary is marked; Esc leaves', async () => {
    const { user, said, steps, cell } = await open()
    const at = steps().findIndex((title) => title.includes('Boundary round T-101')) + 1
    await user.click(screen.getByRole('button', { name: `Show in the table: step ${at}` }))
    expect(screen.getByText(`Step ${at} of ${steps().length > 1 ? steps().length : 12}`)).toBeInTheDocument()
    expect(plain(said('Total flow, stream 107'))).toBe('Total flow, stream 107: 10 939 kg/h, solvable now')
    expect(plain(said('Mass fraction of Water, stream 101'))).toMatch(/75\.00 wt %, known from an earlier step$/)
    expect(said('Total flow, stream 112')).toBe('Total flow, stream 112: still unknown at this step')
    expect(cell('Total flow, stream 112')).toHaveClass('cell-unknown')
    expect(said('Total flow, stream 101')).toMatch(/given$/)
    expect(cell('Stream 107')).toHaveClass('grid-capped')
    expect(cell('Stream 106')).not.toHaveClass('grid-capped')
    await user.click(screen.getByRole('button', { name: 'Next step' }))
    expect(said('Total flow, stream 107')).toMatch(/known from an earlier step$/)
    const next = screen.getByRole('button', { name: 'Next step' })
    for (let step = at + 1; step < 12; step++) await user.click(next)
    expect(next).toHaveAttribute('aria-disabled', 'true')
    expect(next).toHaveFocus()
    for (let step = 12; step > at + 1; step--) await user.click(screen.getByRole('button', { name: 'Previous step' }))
    await user.click(screen.getByRole('button', { name: 'Previous step' }))
    expect(said('Total flow, stream 107')).toMatch(/solvable now$/)
    cell('Total flow, stream 101').focus()
    await user.keyboard('{Delete}')
    expect(said('Total flow, stream 101')).toMatch(/given$/)
    await user.keyboard('{Escape}')
    expect(said('Total flow, stream 112')).toMatch(/solvable now$/)
    expect(cell('Stream 107')).not.toHaveClass('grid-capped')
  }, 90_000)

  it('stand ready for paper with the name of the book, on every sheet, and the caution in full', async () => {
    await open()
    const sheet = document.querySelector('.print-only')
    expect(sheet).toHaveAttribute('aria-hidden', 'true')
    expect(plain(sheet?.querySelector('thead')?.textContent)).toMatch(/: workingsPreliminary$/)
    expect(plain(sheet?.textContent)).toContain('Closed is not the same as correct')
    expect(sheet?.querySelectorAll('h2').length).toBe(12)
  })
})

describe('the workings of plants that react', () => {
  it.each(['demo-b-citrus', 'demo-c-blackmass', 'demo-d-biogas'])(
    '%s: every step has its results and no gap in its words',
    async (name) => {
      const { list, steps } = await open(demoRecords(name))
      expect(steps().length).toBeGreaterThan(3)
      for (const item of list().getAllByRole('listitem')) {
        expect(item.textContent).not.toMatch(/undefined|NaN|\?|null/)
        expect(
          within(item)
            .getByRole('table', { name: /^Results of step/ })
            .querySelectorAll('tr').length,
        ).toBeGreaterThan(1)
      }
    },
  )
})
