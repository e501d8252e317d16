import type { Page } from 'playwright-core'
import { expect } from 'vitest'
import { expectNoSeriousViolations } from './accessibility'
import { allKept, cell, newBlankBook } from './bench'
import { scenario } from './harness'
import { linkMailedTo, mailTo } from './mail'
import { newAddress, newPassword, signUp } from './sign-up'

const teamOf = (page: Page) => new URL(page.url()).pathname.split('/')[1] ?? ''

async function newProject(page: Page, name: string): Promise<void> {
  await page.getByRole('button', { name: 'New project' }).click()
  await page.getByLabel('Name', { exact: true }).fill(name)
  await page.keyboard.press('Enter')
  await page.getByText(`${name} is made.`).waitFor()
}

/** Invites one address from the page of people, which is opened first. */
async function invite(page: Page, address: string, role: RegExp, project?: string): Promise<void> {
  await page.getByRole('link', { name: 'Team', exact: true }).click()
  await page.getByRole('button', { name: 'Invite people' }).click()
  const dialog = page.getByRole('dialog')
  await dialog.getByLabel('E-mail addresses').fill(address)
  await dialog.getByRole('radio', { name: role }).check()
  if (project) await dialog.getByRole('checkbox', { name: project }).check()
  await dialog.getByRole('button', { name: 'Invite', exact: true }).click()
  await page.getByText(`${address} is invited.`).waitFor()
}

/** Somebody without an account comes in by the link of the invitation. */
async function join(page: Page, address: string, name: string): Promise<void> {
  await page.goto(await linkMailedTo(page, address, /invites you/, '/invitation'))
  await page.getByLabel('Your name').fill(name)
  await page.getByLabel('Password', { exact: true }).fill(newPassword)
  await page.getByRole('button', { name: 'Make an account and join' }).click()
  await page.waitForURL(/\/books$/)
}

scenario('an analyst is invited to one project, joins with a new account and sees only that', async (stage) => {
  const { page } = stage
  await signUp(page, 'Olga Brandt')
  const team = teamOf(page)
  await newProject(page, 'Brine works')
  await newProject(page, 'Secret plant')
  const address = newAddress('Lena Koh')
  await invite(page, address, /^Analyst/, 'Brine works')
  await page.getByRole('list', { name: 'Open invitations' }).getByText('Analyst, Brine works').waitFor()
  await expectNoSeriousViolations(page)

  const lena = await stage.anotherPerson()
  const link = await linkMailedTo(page, address, /invites you/, '/invitation')
  await lena.goto(link)
  await lena.getByText('Brine works').waitFor()
  await expectNoSeriousViolations(lena)
  await join(lena, address, 'Lena Koh')
  await lena.getByText('You belong to Brine works.').waitFor()
  expect(teamOf(lena)).toBe(team)
  expect(await lena.getByText('Secret plant').count()).toBe(0)
  expect(await lena.getByRole('link', { name: 'Team', exact: true }).count()).toBe(0)
  for (const path of ['members', 'settings/events', 'settings/mail']) {
    await lena.goto(`/${team}/${path}`)
    await lena.getByRole('heading', { name: 'There is nothing at this address' }).waitFor()
  }

  const late = await stage.anotherPerson()
  await late.goto(link)
  await late.getByText('This invitation has been accepted already. Sign in to go on.').waitFor()
  await page.reload()
  await page.getByRole('rowheader', { name: /Lena Koh/ }).waitFor()
  await page.getByText('No invitation is open.').waitFor()
})

scenario('an invitation is taken up with an account, and told apart from another one', async (stage) => {
  const { page } = stage
  const owner = await signUp(page, 'Rosa Timm')
  const team = teamOf(page)
  const guest = await stage.anotherPerson()
  const address = await signUp(guest, 'Per Dahl')
  const own = teamOf(guest)
  await invite(page, address, /^Checker/)
  const link = await linkMailedTo(page, address, /invites you/, '/invitation')

  await page.goto(link)
  await page.getByText(`You are signed in as ${owner}, and this invitation is for ${address}.`).waitFor()
  const stranger = await stage.anotherPerson()
  await stranger.goto(link)
  await stranger.getByRole('link', { name: 'Sign in to accept' }).click()
  await stranger.waitForURL(/\/sign-in/)
  await stranger.getByLabel('E-mail').fill(address)
  await stranger.getByLabel('Password', { exact: true }).fill(newPassword)
  await stranger.keyboard.press('Enter')
  await stranger.getByRole('button', { name: /^Join / }).click()
  await stranger.waitForURL(`/${team}/books`)

  // Of two teams now, and changes between them.
  await stranger.getByRole('button', { name: /Per Dahl, checker of/ }).click()
  await stranger.getByRole('menuitemradio', { name: "Per Dahl's team" }).click()
  await stranger.waitForURL(`/${own}/books`)
  await stranger.getByRole('button', { name: /Per Dahl, owner of/ }).waitFor()
})

scenario('the last owner cannot leave, give up the role or be taken out', async ({ page }) => {
  await signUp(page, 'Tove Lind')
  const team = teamOf(page)
  const refusal = 'A team needs an owner who can sign in to it. Make somebody else an owner first.'
  await page.getByRole('button', { name: /Tove Lind, owner of/ }).click()
  await page.getByRole('menuitem', { name: 'Leave this team…' }).click()
  await page.getByRole('dialog').getByRole('button', { name: 'Leave the team' }).click()
  await page.getByRole('dialog').getByText(refusal).waitFor()
  await expectNoSeriousViolations(page)
  await page.keyboard.press('Escape')
  await page.getByRole('link', { name: 'Team', exact: true }).click()
  await page.getByLabel('Role of Tove Lind').selectOption('checker')
  await page.getByRole('dialog').getByRole('button', { name: 'Change the role' }).click()
  await page.getByRole('dialog').getByText(refusal).waitFor()
  await page.keyboard.press('Escape')
  expect(await page.getByLabel('Role of Tove Lind').inputValue()).toBe('owner')

  // In another team of hers too.
  await page.getByRole('button', { name: /Tove Lind, owner of/ }).click()
  await page.getByRole('menuitem', { name: 'New team…' }).click()
  await page.getByRole('dialog').getByLabel('Name', { exact: true }).fill('Second yard')
  await page.keyboard.press('Enter')
  await page.waitForURL((url) => url.pathname.endsWith('/books') && !url.pathname.startsWith(`/${team}/`))
  await page.getByText('Second yard').first().waitFor()
})

scenario(
  'who is deactivated is out within one ping of an open book',
  async (stage) => {
    const { page } = stage
    await signUp(page, 'Ines Roth')
    const team = teamOf(page)
    const address = newAddress('Jan Falk')
    await invite(page, address, /^Engineer/)
    const jan = await stage.anotherPerson()
    await join(jan, address, 'Jan Falk')
    await newBlankBook(jan, 'Dilution')
    await jan.getByRole('button', { name: 'Add', exact: true }).click()
    await jan.getByRole('menuitem', { name: 'Streams…' }).click()
    await jan.getByRole('dialog').getByRole('textbox').fill('F')
    await jan.getByRole('dialog').getByRole('button', { name: /add/i }).click()
    await allKept(jan)

    await page.reload()
    await page.getByRole('button', { name: 'Actions for Jan Falk' }).click()
    await page.getByRole('menuitem', { name: 'Deactivate…' }).click()
    await page.getByRole('dialog').getByRole('button', { name: 'Deactivate' }).click()
    await page.getByText('Jan Falk is out of the team.').waitFor()
    await jan.getByText(/Your access to this book has ended/).waitFor({ timeout: 8_000 })
    await jan.getByText('No longer open to you').waitFor()
    const flow = cell(jan, 'Total flow, stream F')
    await flow.click()
    await jan.keyboard.type('5')
    await jan.keyboard.press('Enter')
    expect(await jan.getByRole('button', { name: 'Add', exact: true }).count()).toBe(0)
    expect(await cell(jan, 'Total flow, stream F', 'given').count()).toBe(0)
    await expectNoSeriousViolations(jan)
    await jan.getByRole('link', { name: 'Go to your books' }).click()
    await jan.getByRole('heading', { name: 'You are in no team just now' }).waitFor()
    await jan.goto(`/${team}/books`)
    await jan.getByRole('heading', { name: 'There is nothing at this address' }).waitFor()

    // Let in again, the book is open to him again.
    await page.getByRole('button', { name: 'Actions for Jan Falk' }).click()
    await page.getByRole('menuitem', { name: 'Reactivate…' }).click()
    await page.getByRole('dialog').getByRole('button', { name: 'Reactivate' }).click()
    await page.getByText('Jan Falk is in the team again.').waitFor()
    await jan.goto(`/${team}/books`)
    await jan.getByRole('link', { name: 'Dilution' }).waitFor()
  },
  { allowErrors: [/status of 40[34]/], timeoutMs: 90_000 },
)

scenario('an owner changes the settings, and reads what was done and what was mailed', async (stage) => {
  const { page } = stage
  await signUp(page, 'Ulla Venn')
  const address = newAddress('Kim Ross')
  await invite(page, address, /^Reader/, 'First project')
  await page.getByRole('link', { name: 'Settings' }).click()
  await page.getByLabel('Name', { exact: true }).fill('Venn Minerals')
  await page.getByLabel('Decimal sign').selectOption('comma')
  await page.getByLabel('Flow unit of new books by mass').selectOption('t/d')
  await page.getByLabel('A balance closes within').fill('0,5')
  await page.getByLabel('An analysis is complete up to').fill('90')
  await page.getByRole('button', { name: 'Keep the settings' }).click()
  await page
    .getByText(/must be above the lower limit/)
    .first()
    .waitFor()
  await page.getByLabel('An analysis is complete up to').fill('103')
  await page.getByRole('button', { name: 'Keep the settings' }).click()
  await page.getByText('The settings are kept.').waitFor()
  await expectNoSeriousViolations(page)
  await page.getByRole('link', { name: 'What was done' }).click()
  await page.getByText(/Ulla Venn changed .*the closure limit from 0.1 % to 0.5 %.*/).waitFor()
  await page.getByText(`Ulla Venn invited ${address} as a reader, for project “First project”.`).waitFor()
  await expectNoSeriousViolations(page)
  await mailTo(page, address, /invites you/)
  await page.getByRole('link', { name: 'Mail sent' }).click()
  await page.getByRole('row', { name: new RegExp(`${address}.*Sent`) }).waitFor()
  await expectNoSeriousViolations(page)

  // The team's decimal sign, in a browser whose language has a point.
  await page.getByRole('link', { name: 'Books', exact: true }).click()
  await newBlankBook(page, 'Dilution')
  await page.getByRole('button', { name: 'Add', exact: true }).click()
  await page.getByRole('menuitem', { name: 'Streams…' }).click()
  await page.getByRole('dialog').getByRole('textbox').fill('F')
  await page.getByRole('dialog').getByRole('button', { name: /add/i }).click()
  await cell(page, 'Total flow, stream F').click()
  await page.keyboard.type('3,5')
  await page.keyboard.press('Enter')
  await page.getByRole('gridcell', { name: /^Total flow, stream F: 3,5\d* t\/d/ }).waitFor()
  await allKept(page)
})
