import { mkdirSync } from 'node:fs'
import type { Page } from 'playwright-core'
import { expect } from 'vitest'
import { expectNoSeriousViolations } from './accessibility'
import { allKept, cell, newSaltPlant, said } from './bench'
import { scenario } from './harness'

const PRODUCT = 'Total flow, stream 112'

/** A salt plant whose belt weigher says 10,900 kg/h of product, where the rest says 10,616. */
async function weighedPlant(page: Page): Promise<void> {
  await newSaltPlant(page)
  await cell(page, PRODUCT).click()
  await page.keyboard.type('10900')
  await page.keyboard.press('Enter')
  await cell(page, PRODUCT, 'at odds').waitFor()
}

async function picture(page: Page, name: string): Promise<void> {
  mkdirSync('test-results/browser', { recursive: true })
  await page.evaluate(() => document.fonts.ready)
  await page.screenshot({ path: `test-results/browser/at-odds-${name}.png` })
}

const conflict = (page: Page) => page.getByRole('tabpanel').getByRole('region', { name: 'Conflict 1', exact: true })

scenario('the belt weigher is at odds: withdrawn, undone, kept as a check only, used again', async ({ page }) => {
  await weighedPlant(page)
  await page.getByRole('button', { name: 'See what is at odds' }).click()
  await conflict(page).getByText('+284.19 kg/h').waitFor()
  await picture(page, 'list')
  await expectNoSeriousViolations(page)
  const list = page.getByRole('tabpanel')
  await list.getByRole('button', { name: 'Withdraw total flow of 112' }).click()
  await cell(page, PRODUCT, 'withdrawn').waitFor()
  expect(await said(cell(page, PRODUCT))).toBe(
    'Total flow, stream 112: 10 616 kg/h, solvable now; typed 10 900 kg/h, withdrawn',
  )
  await list.getByText('Nothing is at odds').waitFor()
  await picture(page, 'withdrawn')

  await page.keyboard.press('Control+z')
  await cell(page, PRODUCT, 'at odds').waitFor()
  await cell(page, PRODUCT).click()
  const card = page.getByRole('complementary', { name: 'Cell card' })
  await card.getByText(/Withdrawing this settles 1 of 1 set/).waitFor()
  await picture(page, 'card')
  await card.getByRole('button', { name: 'Keep total flow of 112 as a check only' }).click()
  await cell(page, PRODUCT, 'check only').waitFor()
  await allKept(page)
  await page.reload()
  await cell(page, PRODUCT, 'check only').click()
  await picture(page, 'check-only')
  await card.getByRole('button', { name: 'Use it again' }).click()
  await cell(page, PRODUCT, 'at odds').waitFor()
})

scenario('an uncertainty makes a reading of it, given on the card by keyboard, in the dark', async ({ page }) => {
  await page.emulateMedia({ colorScheme: 'dark' })
  await weighedPlant(page)
  await cell(page, PRODUCT).click()
  await page.keyboard.press('Shift+F6')
  const give = page
    .getByRole('complementary', { name: 'Cell card' })
    .getByRole('button', { name: 'Give total flow of 112 an uncertainty' })
  expect(await give.evaluate((button) => button.closest('aside')?.contains(document.activeElement))).toBe(true)
  await give.press('Enter')
  await page.keyboard.type('109')
  await page.keyboard.press('Enter')
  await page.getByText(/until it is reconciled, which comes with Readings/).waitFor()
  await allKept(page)
  await picture(page, 'uncertainty-dark')
  await expectNoSeriousViolations(page)
  expect(await said(cell(page, PRODUCT))).toBe('Total flow, stream 112: 10 900 kg/h, at odds')
})

scenario(
  'fractions that do not add up are scaled on a narrow screen, and the head of the stream says so',
  async ({ page }) => {
    await newSaltPlant(page)
    await page.setViewportSize({ width: 390, height: 844 })
    const water = cell(page, 'Mass fraction of Water, stream 101')
    await water.click()
    await page.keyboard.type('80 %')
    await page.keyboard.press('Enter')
    await cell(page, 'Mass fraction of Water, stream 101', 'at odds').waitFor()
    await page.getByRole('button', { name: 'See what is at odds' }).click()
    await picture(page, 'narrow-list')
    await expectNoSeriousViolations(page)
    await page
      .getByRole('tabpanel')
      .getByLabel(/fractions of 101 do not add up/i)
      .selectOption({ label: 'Are scaled to 1' })
    await page.getByRole('columnheader', { name: /^Stream 101,.*scaled to 1$/ }).waitFor()
    await picture(page, 'narrow-scaled')
  },
)

scenario('rules are changed as text, and a slip of the pen loses nothing', async ({ page }) => {
  await newSaltPlant(page)
  await page.getByRole('tab', { name: /Rules/ }).click()
  await page.getByRole('button', { name: 'As text', exact: true }).click()
  const text = page.getByLabel('Rules, one a line')
  await text.fill('Q1: split of M-105 to 109 = 60 %\nflow(103) = 0,16 * flow(101)')
  await page.getByRole('button', { name: 'Take the text' }).click()
  await page.getByRole('button', { name: 'Line 2, column 1' }).waitFor()
  await picture(page, 'rules-text')
  await expectNoSeriousViolations(page)
  await text.fill('Q1: split of M-105 to 109 = 60 %\ncheck: flow(103) = 0.16 * flow(101)')
  await text.press('Control+Enter')
  await page.getByRole('button', { name: 'As text', exact: true }).click()
  await page.getByRole('textbox', { name: 'As text' }).nth(1).waitFor()
  await allKept(page)
  await picture(page, 'rules-forms')
})
