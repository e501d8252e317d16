import { readFile } from 'node:fs/promises'
import { expect } from 'vitest'
import { read, type WorkSheet } from 'xlsx'
import { expectNoSeriousViolations } from './accessibility'
import { allKept, cell, newSaltPlant, openSaltPlant, said } from './bench'
import { scenario } from './harness'

scenario(
  'the engineer clears the feed of the salt plant, undoes it, and finds it again after a reload',
  async ({ page }) => {
    await openSaltPlant(page)
    const feed = cell(page, 'Total flow, stream 101')
    const product = cell(page, 'Total flow, stream 112')
    expect(await said(feed)).toBe('Total flow, stream 101: 50 000 kg/h, given')
    expect(await said(product)).toBe('Total flow, stream 112: 10 616 kg/h, solvable now')

    await feed.click()
    await page.keyboard.press('Delete')
    await cell(page, 'Total flow, stream 112', 'still unknown').waitFor({ timeout: 5000 })
    await cell(page, 'Total flow, stream 101', 'still unknown').waitFor()
    await page.getByText('1 more value closes the table').first().waitFor()

    await page.keyboard.press('Control+z')
    await cell(page, 'Total flow, stream 112', 'solvable now').waitFor()
    expect(await said(product)).toBe('Total flow, stream 112: 10 616 kg/h, solvable now')
    await page.keyboard.press('Control+y')
    await cell(page, 'Total flow, stream 112', 'still unknown').waitFor()
    await page.keyboard.press('Control+z')
    await cell(page, 'Total flow, stream 112', 'solvable now').waitFor()
    await allKept(page)

    await page.reload()
    await cell(page, 'Total flow, stream 112', 'solvable now').waitFor()
    expect(await said(feed)).toBe('Total flow, stream 101: 50 000 kg/h, given')
  },
)

scenario('what is typed is kept for tomorrow, with its unit understood', async ({ page }) => {
  await newSaltPlant(page)
  const feed = cell(page, 'Total flow, stream 101')
  await feed.click()
  await page.keyboard.type('1.2 kt/d')
  await page.keyboard.press('Enter')
  await page
    .getByRole('alert')
    .or(cell(page, 'Total flow, stream 101', 'not understood'))
    .first()
    .waitFor()
  await feed.click()
  await page.keyboard.type('1176 t/d')
  await page.keyboard.press('Enter')
  await cell(page, 'Total flow, stream 101: 49', 'given').waitFor()
  await allKept(page)
  await page.reload()
  expect(await said(feed)).toBe('Total flow, stream 101: 49 000 kg/h, given')
  await feed.click()
  await page.keyboard.type('50000')
  await page.keyboard.press('Enter')
  await cell(page, 'Total flow, stream 112: 10', 'solvable now').waitFor()
  await allKept(page)
})

scenario('a wrong entry stays in its cell, marked, with the reason, also after a reload', async ({ page }) => {
  await newSaltPlant(page)
  const feed = cell(page, 'Total flow, stream 101')
  await feed.click()
  await page.keyboard.type('lots')
  await page.keyboard.press('Enter')
  const wrong = page.getByRole('gridcell', { name: /stream 101: “lots”/ })
  await wrong.waitFor()
  expect(await wrong.getAttribute('aria-invalid')).toBe('true')
  expect(await wrong.getAttribute('aria-description')).toMatch(/\w+ .*number/i)
  await allKept(page)
  await page.reload()
  await wrong.waitFor()
  expect(await wrong.textContent()).toBe('lots')
  await wrong.click()
  await page.keyboard.type('50000')
  await page.keyboard.press('Enter')
  await cell(page, 'Total flow, stream 112: 10', 'solvable now').waitFor()
  await allKept(page)
})

scenario('the salt plant goes out as a workbook with the same numbers', async ({ page }) => {
  await openSaltPlant(page)
  const [download] = await Promise.all([
    page.waitForEvent('download'),
    page.getByRole('link', { name: 'Download .xlsx' }).click(),
  ])
  expect(download.suggestedFilename()).toMatch(/Salt section.*\.xlsx$/)
  const book = read(await readFile(await download.path()))
  const sheet = book.Sheets['Stream table'] as WorkSheet
  const numbers = Object.values(sheet).flatMap((value) => (value?.t === 'n' ? [value.v as number] : []))
  expect(numbers.some((value) => Math.abs(value - 10615.80576) < 0.001)).toBe(true)
  expect(book.SheetNames).toContain('Closure')
})

scenario(
  'the workbench and the list of books have no serious accessibility violation, light and dark',
  async ({ page }) => {
    await newSaltPlant(page)
    await expectNoSeriousViolations(page)
    await page.emulateMedia({ colorScheme: 'dark' })
    await expectNoSeriousViolations(page)
    await cell(page, 'Total flow, stream 101').click()
    await page.keyboard.press('Delete')
    await cell(page, 'Total flow, stream 112', 'still unknown').waitFor()
    await expectNoSeriousViolations(page)
    await page.keyboard.press('Control+z')
    await cell(page, 'Total flow, stream 112', 'solvable now').waitFor()
    await allKept(page)
    await page.goBack()
    await page.getByRole('link', { name: 'Salt section', exact: true }).waitFor()
    await expectNoSeriousViolations(page)
  },
)
