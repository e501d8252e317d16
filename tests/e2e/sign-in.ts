import type { Page } from 'playwright-core'
import accounts from '@/db/seed/demo-accounts.json'

/** Signs in on the sign-in page as a person would, and waits until that page is left. */
export async function signIn(page: Page, email: string, password: string = accounts.password): Promise<void> {
  await page.goto('/sign-in')
  await page.getByRole('textbox', { name: /e-?mail/i }).fill(email)
  await page.getByLabel('Password', { exact: true }).fill(password)
  await page.getByRole('button', { name: /^sign in$/i }).click()
  await page.waitForURL((url) => !url.pathname.startsWith('/sign-in'))
}
