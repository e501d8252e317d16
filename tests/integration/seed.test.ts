import { sql } from 'drizzle-orm'
import { expect, it } from 'vitest'
import { POST as authPost } from '@/app/api/auth/[...all]/route'
import { db } from '@/db/client'
import demo from '@/db/seed/demo-accounts.json'
import { seedDemo } from '@/db/seed/seed-demo'
import { contextFrom } from '@/lib/auth/context'
import { roles } from '@/lib/auth/permissions'
import { archiveBook } from '@/lib/data/book/archive-book'
import { getBook } from '@/lib/data/book/get-book'
import { listBooks } from '@/lib/data/book/list-books'
import { listProjects } from '@/lib/data/project/list-projects'
import { listMyTeams } from '@/lib/data/team/list-my-teams'
import { fingerprint } from './fingerprint'
import { value } from './world'

async function signIn(email: string) {
  const origin = 'http://127.0.0.1:3000'
  const request = new Request(`${origin}/api/auth/sign-in/email`, {
    method: 'POST',
    headers: { 'content-type': 'application/json', origin },
    body: JSON.stringify({ email, password: demo.password }),
  })
  const response = await authPost(request)
  return contextFrom(new Headers({ cookie: response.headers.get('set-cookie')?.split(';')[0] ?? '' }))
}

it('the demo team is made once, with an account for each role, and stays as people leave it', async () => {
  expect(await seedDemo()).toMatch(/has been made: five accounts, five plants/)
  const accounts = Object.fromEntries(
    await Promise.all(demo.accounts.map(async ({ role, email }) => [role, await signIn(email)])),
  )
  expect(Object.keys(accounts).sort()).toEqual([...roles].sort())
  for (const role of roles)
    expect(value(await listMyTeams(accounts[role], {}))).toMatchObject([
      { slug: 'kestrel', name: 'Kestrel Process Group', role },
    ])

  const books = value(await listBooks(accounts.engineer, { team: 'kestrel' }))
  expect(books.map(({ name }) => name).sort()).toEqual([
    'Biogas upgrading',
    'Black-mass leach',
    'Peel press and limonene recovery',
    'Salt section',
    'Whey protein filtration',
  ])
  const salt = books.find(({ name }) => name === 'Salt section')
  expect(salt).toMatchObject({ projectName: 'Kestrel Flats Salt Works', documentNumber: 'KF-100-PR-HMB-0001' })
  const { records, mayEdit } = value(await getBook(accounts.engineer, { book: salt?.id ?? '' }))
  expect(records.filter(({ kind }) => kind === 'stream')).toHaveLength(12)
  expect(mayEdit).toBe(true)
  expect(value(await getBook(accounts.checker, { book: salt?.id ?? '' })).mayEdit).toBe(false)
  const projects = async (role: string) =>
    value(await listProjects(accounts[role], { team: 'kestrel' })).map(({ name }) => name)
  expect(await projects('analyst')).toEqual(['Kestrel Flats Salt Works', 'Nordvik Battery Metals'])
  expect(await projects('reader')).toEqual(['Kestrel Flats Salt Works'])
  expect(await projects('checker')).toHaveLength(5)

  value(await archiveBook(accounts.owner, { team: 'kestrel', book: salt?.id ?? '' }))
  const before = await fingerprint('demo-kestrel')
  expect(await seedDemo()).toBe('The demo team Kestrel Process Group is there.')
  expect(await fingerprint('demo-kestrel')).toBe(before)

  await db.execute(sql`delete from mark where name = 'demo'`) // as if the first run had been cut off at its very end
  await seedDemo()
  expect(await fingerprint('demo-kestrel')).toBe(before)
})

it('two seeds at once make one demo team', async () => {
  const said = await Promise.all([seedDemo(), seedDemo()])
  expect(said).toEqual(Array(2).fill('The demo team Kestrel Process Group is there.'))
})
