import { expect } from 'vitest'
import { cell, openSaltPlant } from './bench'
import { scenario } from './harness'
import { signIn } from './sign-in'

scenario('a checker reads the salt plant and cannot edit it', async ({ page, baseUrl }) => {
  await openSaltPlant(page, 'checker@kestrel.example')
  await page.getByText('You can read this book; checkers do not edit it.').waitFor()
  const feed = cell(page, 'Total flow, stream 101')
  await feed.click()
  await page.keyboard.type('1')
  await page.keyboard.press('Enter')
  await feed.click()
  await page.keyboard.press('Delete')
  await page.keyboard.press('Control+x')
  await cell(page, 'Total flow, stream 101', 'given').waitFor()
  expect(await page.getByRole('button', { name: /^add$/i }).count()).toBe(0)
  const bookId = new URL(page.url()).pathname.split('/').at(-1)
  const change = { id: 'change-by-a-checker', label: 'x', create: [], update: [], remove: [] }
  const answer = await page.request.post(`/api/books/${bookId}/changes`, {
    headers: { origin: baseUrl },
    data: { changes: [change] },
  })
  expect(answer.status()).toBe(403)
})

scenario('a reader has no way into a working table, nor has an analyst', async ({ page, anotherPerson, baseUrl }) => {
  await openSaltPlant(page)
  const path = new URL(page.url()).pathname
  const bookId = path.split('/').at(-1)
  for (const email of ['reader@kestrel.example', 'analyst@kestrel.example']) {
    const other = await anotherPerson()
    await signIn(other, email)
    expect(await other.getByRole('link', { name: 'Salt section' }).count()).toBe(0)
    await other.goto(path)
    expect(await other.getByRole('grid').count()).toBe(0)
    for (const route of [
      `/api/books/${bookId}`,
      `/api/books/${bookId}/changes?after=0`,
      `/api/books/${bookId}/table.xlsx`,
    ])
      expect((await other.request.get(route)).status()).toBeGreaterThanOrEqual(403)
    const written = await other.request.post(`/api/books/${bookId}/changes`, {
      headers: { origin: baseUrl },
      data: { changes: [{ id: 'change-by-a-reader', label: 'x', create: [], update: [], remove: [] }] },
    })
    expect(written.status()).toBeGreaterThanOrEqual(403)
  }
})

scenario('signed out, a book leads to the sign-in page and back to the book', async ({ page, anotherPerson }) => {
  await openSaltPlant(page)
  const path = new URL(page.url()).pathname
  const other = await anotherPerson()
  await other.goto(path)
  await other.waitForURL(/\/sign-in\?next=/)
  await other.getByLabel(/e-?mail/i).fill('engineer@kestrel.example')
  await other
    .getByLabel(/password/i)
    .first()
    .fill('brook-and-tally')
  await other.keyboard.press('Enter')
  await other.waitForURL((url) => url.pathname === path)
})
