import { expect } from 'vitest'
import { allKept, cell, newBlankBook, putOnClipboard, said } from './bench'
import { scenario } from './harness'
import { linkMailedTo } from './mail'
import { signUp } from './sign-up'

scenario(
  'from sign-up to a first solved table by keyboard alone',
  async ({ page }) => {
    const press = async (...keys: string[]) => {
      for (const key of keys) await page.keyboard.press(key)
    }
    /** Goes on with Tab until what has the focus answers to a name, as one does without a mouse. */
    const tabTo = async (name: RegExp) => {
      for (let step = 0; step < 60; step++) {
        await page.keyboard.press('Tab')
        const now = await page.evaluate(() => {
          const element = document.activeElement as HTMLElement | null
          const labels = element && 'labels' in element ? [...(element as HTMLInputElement).labels!] : []
          return [element?.getAttribute('aria-label'), ...labels.map((l) => l.textContent), element?.textContent].join(
            ' ',
          )
        })
        if (name.test(now)) return
      }
      throw new Error(`Tab does not lead to ${name}`)
    }
    await page.goto('/')
    await tabTo(/make an account|sign up/i)
    await press('Enter')
    await page.waitForURL(/sign-up/)
    await page.getByLabel('Your name').waitFor()
    const name = await page.evaluate(() => (document.activeElement as HTMLInputElement | null)?.name ?? '')
    if (name !== 'name') await tabTo(/your name/i)
    await page.keyboard.type('Ada Fennholt')
    await tabTo(/work e-mail/i)
    const address = `ada.${Date.now()}@plant.example`
    await page.keyboard.type(address)
    await tabTo(/^\s*password/i)
    await page.keyboard.type('a long enough password')
    await press('Enter')
    await page.getByRole('heading', { name: 'Now look in your mail' }).waitFor()
    await page.goto(await linkMailedTo(page, address, /Confirm your e-mail address/, '/verify'))
    await tabTo(/confirm this address/i)
    await press('Enter')
    await page.getByRole('heading', { name: 'Your address is confirmed' }).waitFor()
    await tabTo(/sign in/i)
    await press('Enter')
    await page.waitForURL(/sign-in/)
    await tabTo(/^\s*e-mail/i)
    await page.keyboard.type(address)
    await tabTo(/^\s*password/i)
    await page.keyboard.type('a long enough password')
    await press('Enter')
    await page.waitForURL(/\/books$/)
    await tabTo(/new book/i)
    await press('Enter')
    await page.getByRole('dialog').waitFor()
    await tabTo(/^\s*name/i)
    await page.keyboard.type('Dilution')
    await press('Enter')
    await page.waitForURL(/\/books\/[^/]+$/)

    for (const [button, list] of [
      ['Add streams', 'F\nW\nP'],
      ['Add components', 'salt\nwater'],
      ['Add units', 'M-1'],
    ] as const) {
      const offered = page.getByRole('button', { name: `${button}…` })
      if (await offered.isVisible()) await tabTo(new RegExp(`^\\s*${button}`))
      else {
        await tabTo(/^\s*add\s*$/i)
        await press('Enter')
        await page.getByRole('menu').waitFor()
        const item = page.getByRole('menuitem', { name: new RegExp(`^${button.replace('Add ', '')}…`, 'i') })
        for (let step = 0; step < 6 && !(await item.evaluate((e) => e === document.activeElement)); step++)
          await press('ArrowDown')
      }
      await press('Enter')
      await page.getByRole('dialog').waitFor()
      const lines = list.split('\n')
      for (const [index, line] of lines.entries()) {
        await page.keyboard.type(line)
        if (index < lines.length - 1) await press('Enter')
      }
      await press('Control+Enter')
      await page.getByRole('dialog').waitFor({ state: 'hidden' })
    }

    // Total flow of F, its salt fraction, and the salt fraction of P; the water is pure.
    await page.getByRole('rowheader', { name: /^Unit M-1/ }).waitFor()
    const inTable = () => page.evaluate(() => document.activeElement?.closest('#grid-table') != null)
    for (let step = 0; step < 80 && !(await inTable()); step++) await press('Tab')
    expect(await inTable()).toBe(true)
    await press('Control+Home')
    const to = async (place: string) => {
      for (let step = 0; step < 40; step++) {
        const now = await page.evaluate(() => document.activeElement?.getAttribute('aria-label') ?? '')
        if (now.startsWith(place)) return
        const wantsRight = await page.evaluate(
          ([want]) => {
            const target = [...document.querySelectorAll('[role=gridcell]')].find((c) =>
              c.getAttribute('aria-label')?.startsWith(want!),
            )
            const here = document.activeElement
            if (!target || !here) return 'ArrowDown'
            const column = (element: Element) => Number(element.getAttribute('aria-colindex'))
            const row = (element: Element) => Number(element.closest('[aria-rowindex]')?.getAttribute('aria-rowindex'))
            if (row(here) < row(target)) return 'ArrowDown'
            if (row(here) > row(target)) return 'ArrowUp'
            return column(here) < column(target) ? 'ArrowRight' : 'ArrowLeft'
          },
          [place],
        )
        await press(wantsRight)
      }
      throw new Error(`The arrow keys do not lead to ${place}`)
    }
    await to('To, stream F')
    await page.keyboard.type('M-1')
    await press('Tab')
    await page.keyboard.type('M-1')
    await press('Enter')
    await to('From, stream P')
    await page.keyboard.type('M-1')
    await press('Enter')
    await to('Total flow, stream F')
    await page.keyboard.type('100')
    await press('Enter')
    await to('Mass fraction of salt, stream F')
    await page.keyboard.type('20 %')
    await press('Enter')
    await to('Mass fraction of salt, stream W')
    await page.keyboard.type('0')
    await press('Enter')
    await to('Mass fraction of salt, stream P')
    await page.keyboard.type('8')
    await press('Enter')
    await cell(page, 'Total flow, stream P', 'solvable now').waitFor()
    expect(await said(cell(page, 'Total flow, stream P'))).toBe('Total flow, stream P: 250.0 kg/h, solvable now')
    expect(await said(cell(page, 'Total flow, stream W'))).toBe('Total flow, stream W: 150.0 kg/h, solvable now')
    await page.getByText('Nothing is still unknown').first().waitFor()
    await allKept(page)
  },
  { timeoutMs: 120_000 },
)

scenario('a block of 20 streams by 5 components comes in from another spreadsheet by one paste', async ({ page }) => {
  await signUp(page, 'Bea Marisol')
  await newBlankBook(page, 'Block')
  const add = async (what: string, list: string[]) => {
    await page
      .getByRole('button', { name: `${what}…` })
      .or(page.getByRole('button', { name: 'Add', exact: true }))
      .first()
      .click()
    const item = page.getByRole('menuitem', { name: new RegExp(`^${what.replace('Add ', '')}…`, 'i') })
    if (await item.isVisible()) await item.click()
    await page.getByRole('dialog').getByRole('textbox').fill(list.join('\n'))
    await page.keyboard.press('Control+Enter')
    await page.getByRole('dialog').waitFor({ state: 'hidden' })
  }
  const streams = Array.from({ length: 20 }, (_, index) => `${201 + index}`)
  const components = ['A', 'B', 'C', 'D', 'E']
  await add('Add components', components)
  await add('Add streams', streams)
  const block = components.map((_, row) => streams.map((__, column) => `${(row + 1) * 100 + column}.5`))
  await putOnClipboard(page, block.map((row) => row.join('\t')).join('\r\n'))
  await cell(page, 'Component flow of A, stream 201').click()
  await page.keyboard.press('Control+v')
  await cell(page, 'Component flow of A, stream 201: 100.5', 'given').waitFor()
  await cell(page, 'Component flow of E, stream 201: 500.5', 'given').waitFor()
  await page.keyboard.press('Control+ArrowRight')
  await cell(page, 'Component flow of A, stream 220: 119.5', 'given').waitFor()
  await cell(page, 'Total flow, stream 220', 'solvable now').waitFor()
  await allKept(page)

  await page.keyboard.press('Control+z')
  await cell(page, 'Component flow of A, stream 220', 'still unknown').waitFor()
  await page.keyboard.press('Control+y')
  await cell(page, 'Component flow of A, stream 220: 119.5', 'given').waitFor()
  await allKept(page)
  await page.reload()
  await cell(page, 'Component flow of E, stream 201: 500.5', 'given').waitFor()

  await cell(page, 'Component flow of A, stream 201').click()
  await page.keyboard.down('Shift')
  for (const key of ['ArrowRight', 'ArrowDown']) await page.keyboard.press(key)
  await page.keyboard.up('Shift')
  await page.keyboard.press('Control+c')
  const copied = await page.evaluate(() => navigator.clipboard.readText())
  expect(copied.replace(/\r/g, '').trim()).toBe('100.5\t101.5\n200.5\t201.5')
})

scenario('connections are made by keys, and a stream with two sinks is refused at its place', async ({ page }) => {
  await signUp(page, 'Cai Nordvik')
  await newBlankBook(page, 'Links')
  await page.getByRole('button', { name: 'Add streams…' }).click()
  await page.getByRole('dialog').getByRole('textbox').fill('1\n2')
  await page.keyboard.press('Control+Enter')
  await page
    .getByRole('button', { name: /^(units|add units…)$/i })
    .first()
    .click()
  await page.getByRole('dialog').getByRole('textbox').fill('U-1\nU-2')
  await page.keyboard.press('Control+Enter')
  const link = (stream: string, unit: string) => page.getByRole('gridcell', { name: `Stream ${stream}, unit ${unit}:` })
  await link('1', 'U-1').click()
  await page.getByRole('gridcell', { name: 'Stream 1, unit U-1: in' }).waitFor()
  await page.keyboard.press('ArrowDown')
  await page.keyboard.press('i')
  await page.getByText(/already enters U-1/).waitFor()
  await page.getByRole('button', { name: 'Let it enter U-2 instead' }).click()
  await page.getByRole('gridcell', { name: 'Stream 1, unit U-2: in' }).waitFor()
  await page.getByRole('gridcell', { name: 'Stream 1, unit U-1: not connected' }).waitFor()
  await page.getByRole('gridcell', { name: 'To, stream 1: U-2' }).waitFor()
  await allKept(page)
})
