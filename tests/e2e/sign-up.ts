import type { Page } from 'playwright-core'
import { linkMailedTo } from './mail'
import { signIn } from './sign-in'

export const newPassword = 'a long enough password'

/** An address that nobody had before, with the name in it. */
export const newAddress = (name: string): string =>
  `${name.toLowerCase().replace(/\W+/g, '.')}.${Math.random().toString(36).slice(2)}@plant.example`

/** A person nobody has been before signs up, confirms the address by mail and signs in. Gives back the address. */
export async function signUp(page: Page, name: string): Promise<string> {
  const address = newAddress(name)
  await page.goto('/sign-up')
  await page.getByLabel('Your name').fill(name)
  await page.getByLabel('Work e-mail').fill(address)
  await page.getByLabel('Password', { exact: true }).fill(newPassword)
  await page.keyboard.press('Enter')
  await page.getByRole('heading', { name: 'Now look in your mail' }).waitFor()
  await page.goto(await linkMailedTo(page, address, /Confirm your e-mail address/, '/verify'))
  await page.getByRole('button', { name: 'Confirm this address' }).click()
  await page.getByRole('heading', { name: 'Your address is confirmed' }).waitFor()
  await signIn(page, address, newPassword)
  await page.waitForURL(/\/books$/)
  return address
}
