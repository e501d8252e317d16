import { expect } from 'vitest'
import { codeFor } from '../integration/authenticator'
import { expectNoSeriousViolations } from './accessibility'
import { scenario } from './harness'
import { linkMailedTo, mailTo } from './mail'
import { signIn } from './sign-in'
import { newAddress, newPassword, signUp } from './sign-up'

scenario(
  'a password is reset by mail, with the same answer for every address',
  async (stage) => {
    const { page } = stage
    const address = await signUp(page, 'Nils Aker')
    const other = await stage.anotherPerson()
    const ask = async (email: string) => {
      await other.goto('/sign-in')
      await other.getByRole('link', { name: 'The password is lost' }).click()
      await other.waitForURL(/\/reset/)
      await other.getByLabel('E-mail').fill(email)
      await other.getByRole('button', { name: 'Mail me a link' }).click()
      const heading = other.getByRole('heading', { name: 'Look in your mail' })
      await heading.waitFor()
      return ((await other.getByRole('main').textContent()) ?? '').replace(email, '…')
    }
    const unknown = await ask(newAddress('Nobody'))
    expect(await ask(address)).toBe(unknown)
    await expectNoSeriousViolations(other)

    const link = await linkMailedTo(other, address, /Choose a new password/, '/reset')
    await other.goto(link)
    await other.getByLabel('New password', { exact: true }).fill('another long password')
    await other.getByRole('button', { name: 'Change the password' }).click()
    await other.getByRole('heading', { name: 'Your password is changed' }).waitFor()
    await mailTo(other, address, /Your password was changed/)
    // Signed out everywhere, and the former password is worth nothing.
    await page.reload()
    await page.waitForURL(/\/sign-in/)
    await page.getByLabel('E-mail').fill(address)
    await page.getByLabel('Password', { exact: true }).fill(newPassword)
    await page.keyboard.press('Enter')
    await page.getByText(/do not belong together/).waitFor()
    await signIn(page, address, 'another long password')

    await other.goto(link)
    await other.getByLabel('New password', { exact: true }).fill('a third long password')
    await other.getByRole('button', { name: 'Change the password' }).click()
    await other.getByRole('heading', { name: 'This link is of no use any more' }).waitFor()
  },
  { allowErrors: [/status of 40[01]/] },
)

scenario(
  'a second step is set up, asked for, stood in for by a backup code, and turned off',
  async (stage) => {
    const { page } = stage
    const address = await signUp(page, 'Mira Sand')
    await page.getByRole('button', { name: /Mira Sand, owner of/ }).click()
    await page.getByRole('menuitem', { name: 'Your account' }).click()
    await page.getByRole('heading', { name: 'Your account' }).waitFor()
    await expectNoSeriousViolations(page)
    const part = page.getByRole('region', { name: 'Second step of signing in' })
    await part.getByRole('button', { name: 'Set it up' }).click()
    await part.getByLabel('Your password').fill('not the right one')
    await page.keyboard.press('Enter')
    await part.getByText('This is not your present password.').first().waitFor()
    await part.getByLabel('Your password').fill(newPassword)
    await page.keyboard.press('Enter')
    await part.getByRole('img', { name: /QR code/ }).waitFor()
    await expectNoSeriousViolations(page)
    const key = ((await part.getByText(/^[A-Z2-7]{4}( [A-Z2-7]+)+$/).textContent()) ?? '').replace(/\s/g, '')
    const code = () => codeFor(`otpauth://totp/x?secret=${key}`)
    await part.getByLabel('The code that it shows now').fill(code())
    await page.keyboard.press('Enter')
    const list = part.getByRole('list', { name: 'Backup codes' })
    await list.waitFor()
    const codes = await list.getByRole('listitem').allTextContents()
    expect(codes).toHaveLength(10)
    await part.getByRole('button', { name: 'Copy them' }).click()
    expect(await page.evaluate(() => navigator.clipboard.readText())).toBe(codes.join('\n'))
    await part.getByRole('button', { name: 'I have kept them' }).click()
    await part.getByText('On', { exact: true }).waitFor()

    const other = await stage.anotherPerson()
    const password = async () => {
      await other.goto('/sign-in')
      await other.getByLabel('E-mail').fill(address)
      await other.getByLabel('Password', { exact: true }).fill(newPassword)
      await other.keyboard.press('Enter')
      await other.getByLabel('Code from your authenticator').waitFor()
    }
    await password()
    await expectNoSeriousViolations(other)
    await other.goto('/account')
    await other.waitForURL(/\/sign-in/)
    await password()
    await other
      .getByLabel('Code from your authenticator')
      .fill(String((Number(code()) + 500_000) % 1_000_000).padStart(6, '0'))
    await other.keyboard.press('Enter')
    await other
      .getByText(/This code is not right/)
      .first()
      .waitFor()
    await other.getByLabel('Code from your authenticator').fill(code())
    await other.keyboard.press('Enter')
    await other.waitForURL(/\/books$/)

    await page.reload()
    const places = page.getByRole('list', { name: 'Places where you are signed in' })
    await places.getByText('This one').waitFor()
    await places.getByRole('button', { name: 'Sign out there' }).first().click()
    await page.getByText(/is signed out\./).waitFor()
    await other.reload()
    await other.waitForURL(/\/sign-in/)
    await password()
    await other.getByRole('button', { name: 'Use a backup code' }).click()
    await other.getByLabel('Backup code').fill(codes[0] ?? '')
    await other.keyboard.press('Enter')
    await other.waitForURL(/\/books$/)

    await part.getByRole('button', { name: 'Turn it off' }).click()
    await part.getByLabel('Your password').fill(newPassword)
    await page.keyboard.press('Enter')
    await part.getByText('Off', { exact: true }).waitFor()
    await signIn(await stage.anotherPerson(), address, newPassword)
  },
  { allowErrors: [/status of 40[01]/], timeoutMs: 120_000 },
)
