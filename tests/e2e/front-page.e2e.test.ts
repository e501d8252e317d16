import { expect } from 'vitest'
import { expectNoSeriousViolations } from './accessibility'
import { scenario } from './harness'

scenario('the front page opens', async ({ page }) => {
  const response = await page.goto('/')
  expect(response?.status()).toBe(200)
  await page.getByRole('heading', { level: 1 }).first().waitFor()
  await expectNoSeriousViolations(page)
})
