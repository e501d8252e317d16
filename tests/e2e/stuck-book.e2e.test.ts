import { mkdirSync, readFileSync } from 'node:fs'
import type { Page } from 'playwright-core'
import { expect } from 'vitest'
import { expectNoSeriousViolations } from './accessibility'
import { cell, said } from './bench'
import { scenario } from './harness'

const PRODUCT = 'Total flow, stream 112'
const MOISTURE = 'Mass fraction of Water, stream 107'
const results = 'test-results/browser'

async function picture(page: Page, name: string): Promise<void> {
  mkdirSync(results, { recursive: true })
  await page.evaluate(() => document.fonts.ready)
  await page.screenshot({ path: `${results}/stuck-book-${name}.png` })
}

/** The wet cake's flow as the demo's own sheet has it. */
function cakeFlow(): number {
  const sheet = JSON.parse(readFileSync('tests/fixtures/demo/demo-a-salt.json', 'utf8'))
  return sheet.solution.total['107']
}

/** `shown`: a cell that is solvable at the start, in the part of the table that the screen shows. */
async function openSample(page: Page, shown = PRODUCT): Promise<void> {
  await page.goto('/sample')
  await cell(page, shown, 'solvable now').waitFor()
}

const tab = (page: Page, name: string) => page.getByRole('tab', { name: new RegExp(`^${name}`) })

scenario(
  'a stuck book is closed by the value it asks for, and its workings are walked through and printed',
  async ({ page }) => {
    await openSample(page)
    await cell(page, MOISTURE).click()
    await page.keyboard.press('Delete')
    await cell(page, PRODUCT, 'still unknown').waitFor()
    const card = page.getByRole('complementary', { name: 'Cell card' })
    await card
      .getByRole('list', { name: 'Boundaries of this stream' })
      .getByText(/is short by/)
      .first()
      .waitFor()
    await picture(page, 'why-unknown')

    await page.getByRole('button', { name: 'What to measure next' }).click()
    const values = page.getByRole('tabpanel').getByRole('region', { name: 'Single values' })
    await values.getByRole('button', { name: 'Total flow of 107', exact: true }).click()
    await cell(page, 'Total flow, stream 107', 'still unknown').and(page.locator(':focus')).waitFor()
    await page.keyboard.type(cakeFlow().toFixed(2))
    await page.keyboard.press('Enter')
    await cell(page, PRODUCT, 'solvable now').waitFor()
    expect(await said(cell(page, PRODUCT))).toBe(`${PRODUCT}: 10 616 kg/h, solvable now`)
    await page.getByRole('region', { name: 'How far the table is' }).getByText('the table closes').first().waitFor()

    await tab(page, 'Workings').click()
    const panel = page.getByRole('tabpanel')
    await panel.getByRole('heading', { name: /^Step 1: / }).waitFor()
    await picture(page, 'workings')
    await expectNoSeriousViolations(page)
    const steps = await panel.getByRole('heading', { name: /^Step \d+: / }).count()
    await panel.getByRole('button', { name: 'Work through it' }).click()
    await cell(page, PRODUCT, 'still unknown at this step').waitFor()
    for (let step = 2; step <= steps; step++) await page.getByRole('button', { name: 'Next step' }).click()
    await panel.getByText(`Step ${steps} of ${steps}`).waitFor()
    await cell(page, PRODUCT, '(?:solvable now|known from an earlier step)').waitFor()
    await picture(page, 'walk')
    await page.keyboard.press('Escape')
    await panel.getByRole('button', { name: 'Work through it' }).waitFor()

    const file = `${results}/stuck-book-workings.pdf`
    const pdf = await page.pdf({ path: file, preferCSSPageSize: true, printBackground: true })
    const text = pdf.toString('latin1')
    expect(text.startsWith('%PDF-')).toBe(true)
    const sheets = text.match(/\/Type\s*\/Page\b/g) ?? []
    expect(sheets.length).toBeGreaterThan(1)
    // A4 upright, in points.
    expect(text).toMatch(/\/MediaBox\s*\[0 0 59[4-6](\.\d+)? 84[12](\.\d+)?\]/)
  },
  { timeoutMs: 120_000 },
)

scenario('boundaries, workings and closure fit a narrow screen in the dark', async ({ page }) => {
  await page.emulateMedia({ colorScheme: 'dark' })
  await page.setViewportSize({ width: 390, height: 844 })
  await openSample(page, 'Total flow, stream 102')
  await tab(page, 'Boundaries').click()
  await page.getByRole('table', { name: 'Boundaries' }).getByRole('button', { name: 'D-106', exact: true }).click()
  await page.getByRole('columnheader', { name: /^Stream 101/ }).waitFor()
  await picture(page, 'narrow-boundaries')
  await expectNoSeriousViolations(page)
  await tab(page, 'Workings').click()
  await page.getByRole('heading', { name: /^Step 1: / }).waitFor()
  await picture(page, 'narrow-workings')
  await expectNoSeriousViolations(page)
  await tab(page, 'Closure').click()
  await page.getByRole('table', { name: 'Closure by unit' }).waitFor()
  await picture(page, 'narrow-closure')
  await expectNoSeriousViolations(page)
  // Nothing sticks out of the page to the side.
  expect(await page.evaluate(() => document.documentElement.scrollWidth)).toBeLessThanOrEqual(390)
})
