import type { Locator, Page } from 'playwright-core'
import { signIn } from './sign-in'

/** Opens a book of the demo team from the list, as the person signed in. */
export async function openBook(page: Page, name: string): Promise<void> {
  await page.getByRole('link', { name, exact: true }).click()
  await page.getByRole('grid', { name: /stream table/i }).waitFor()
}

export async function openSaltPlant(page: Page, email = 'engineer@kestrel.example'): Promise<void> {
  await signIn(page, email)
  await openBook(page, 'Salt section')
  await cell(page, 'Total flow, stream 112', 'solvable now').waitFor()
}

/** A salt plant of this scenario's own, made from the starter by the engineer and opened. */
export async function newSaltPlant(page: Page): Promise<void> {
  await signIn(page, 'engineer@kestrel.example')
  await page
    .getByRole('button', { name: /new book/i })
    .first()
    .click()
  await page.getByRole('radio', { name: /salt/i }).check()
  await page.getByLabel('Name', { exact: true }).fill(`Salt trial ${Math.random().toString(36).slice(2)}`)
  await page.keyboard.press('Enter')
  await page.waitForURL(/\/books\/[^/]+$/)
  await cell(page, 'Total flow, stream 112', 'solvable now').waitFor()
}

/** A cell by what a screen reader says: its place, perhaps how its value begins, and the state at the end. */
export function cell(page: Page, place: string, state?: string): Locator {
  const escaped = place.replace(/[.*+?^${}()|[\]\\]/g, '\\$&')
  return page.getByRole('gridcell', {
    name: new RegExp(`^${escaped}${place.includes(': ') ? '' : ':'}.*${state ? `${state}$` : ''}`),
  })
}

/** The words of a cell with every kind of space made plain. */
export async function said(locator: Locator): Promise<string> {
  return ((await locator.getAttribute('aria-label')) ?? '').replace(/\s/g, ' ')
}

/** Waits until everything typed is on the server. */
export async function allKept(page: Page): Promise<void> {
  await page.getByText('All changes kept').waitFor()
}

/** Puts a text on the clipboard, as another program would. */
export async function putOnClipboard(page: Page, text: string): Promise<void> {
  await page.evaluate((value) => navigator.clipboard.writeText(value), text)
}

/** A new blank book in the first project, opened. */
export async function newBlankBook(page: Page, name: string): Promise<void> {
  await page
    .getByRole('button', { name: /new book/i })
    .first()
    .click()
  await page.getByLabel('Name', { exact: true }).fill(name)
  await page.keyboard.press('Enter')
  await page.waitForURL(/\/books\/[^/]+$/)
}
