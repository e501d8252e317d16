import { eq, sql } from 'drizzle-orm'
import { afterEach, describe, expect, it } from 'vitest'
import { POST as authPost } from '@/app/api/auth/[...all]/route'
import { db } from '@/db/client'
import { account, session, user } from '@/db/schema/account'
import { contextFrom } from '@/lib/auth/context'
import { newId } from '@/lib/book/ids'
import { listProjects } from '@/lib/data/project/list-projects'
import { listMyTeams } from '@/lib/data/team/list-my-teams'
import { codeOf, value } from './world'

const origin = 'http://127.0.0.1:3000'
const password = 'a long enough one'

const post = (path: string, body: unknown, headers: Record<string, string> = {}) =>
  authPost(
    new Request(`${origin}/api/auth${path}`, {
      method: 'POST',
      headers: { 'content-type': 'application/json', origin, ...headers },
      body: JSON.stringify(body),
    }),
  )

const signUp = (name: string, email: string) => post('/sign-up/email', { name, email, password })
const cookieOf = (response: Response) => (response.headers.get('set-cookie') ?? '').split(';')[0] ?? ''
const whoIs = async (response: Response) => contextFrom(new Headers({ cookie: cookieOf(response) }))

describe('signing up', () => {
  it('makes a team with a first project, and signs in', async () => {
    const email = `${newId()}@x.example`
    const ctx = await whoIs(await signUp('  Ada Lovelace ', email))
    expect(ctx.userId).not.toBeNull()
    const [mine, ...others] = value(await listMyTeams(ctx, {}))
    expect(others).toEqual([])
    expect(mine).toMatchObject({ name: "Ada Lovelace's team", role: 'owner' })
    expect(mine?.slug).toMatch(/^ada-lovelace(-|$)/)
    expect(value(await listProjects(ctx, { team: mine?.slug ?? '' }))).toMatchObject([
      { name: 'First project', bookCount: 0 },
    ])
  })

  it('gives people of one name addresses of their own, even at one moment', async () => {
    const name = `Grace ${newId()}`
    const responses = await Promise.all(Array.from({ length: 6 }, () => signUp(name, `${newId()}@x.example`)))
    const slugs = await Promise.all(
      responses.map(async (response) => value(await listMyTeams(await whoIs(response), {}))[0]?.slug),
    )
    expect(new Set(slugs).size).toBe(6)
    expect(slugs).not.toContain(undefined)
  })

  it.each(['山田 太郎', 'API', 'Sign In', '_next'])('gives %s an address that is no page of ours', async (name) => {
    const [mine] = value(await listMyTeams(await whoIs(await signUp(name, `${newId()}@x.example`)), {}))
    expect(mine?.slug).toMatch(/team|^next-/)
  })

  it.each([
    ['an empty name', '  ', /Type your name/],
    ['a name with a line break', 'Ada\nLovelace', /cannot be shown/],
    ['a very long name', 'x'.repeat(101), /longer than 100/],
  ])('refuses %s in a plain sentence', async (_, name, sentence) => {
    const email = `${newId()}@x.example`
    const response = await signUp(name, email)
    expect(response.status).toBe(400)
    expect(((await response.json()) as { message: string }).message).toMatch(sentence)
    expect(await db.select().from(user).where(eq(user.email, email))).toEqual([])
  })

  it('refuses a short password', async () => {
    const response = await post('/sign-up/email', { name: 'Ada', email: `${newId()}@x.example`, password: 'short' })
    expect(response.status).toBe(400)
  })

  describe('when the team cannot be made', () => {
    afterEach(() => db.execute(sql`drop trigger if exists no_projects on project`))

    it('leaves no account behind, and can be tried again', async () => {
      const email = `${newId()}@x.example`
      const name = `Mary ${newId()}`
      await db.execute(
        sql`create or replace function refuse() returns trigger as $$ begin raise 'refused'; end $$ language plpgsql`,
      )
      await db.execute(sql`create trigger no_projects before insert on project for each row execute function refuse()`)
      const response = await signUp(name, email)
      expect(response.status).toBe(500)
      expect(((await response.json()) as { error: { message: string } }).error.message).toMatch(
        /went wrong on our side/,
      )
      expect(await db.select().from(user).where(eq(user.email, email))).toEqual([])
      await db.execute(sql`drop trigger no_projects on project`)
      expect((await signUp(name, email)).status).toBe(200)
    })
  })
})

describe('signing in', () => {
  it('needs the right password, and keeps only a hash of it', async () => {
    const email = `${newId()}@x.example`
    await signUp('Ada', email)
    expect((await post('/sign-in/email', { email, password: 'not the right one' })).status).toBe(401)
    const response = await post('/sign-in/email', { email, password })
    expect(response.status).toBe(200)
    expect(response.headers.get('set-cookie')).toMatch(/HttpOnly; SameSite=Lax/)
    const { userId } = await whoIs(response)
    const [kept] = await db
      .select()
      .from(account)
      .where(eq(account.userId, userId ?? ''))
    expect(kept?.password).not.toContain(password)
  })

  it('ends with signing out', async () => {
    const response = await signUp('Ada', `${newId()}@x.example`)
    const ctx = await whoIs(response)
    expect((await post('/sign-out', {}, { cookie: cookieOf(response) })).status).toBe(200)
    expect((await whoIs(response)).userId).toBeNull()
    expect(codeOf(await listMyTeams(await whoIs(response), {}))).toBe('signedOut')
    expect(
      await db
        .select()
        .from(session)
        .where(eq(session.userId, ctx.userId ?? '')),
    ).toEqual([])
  })

  it('is not taken from a forged or an ended cookie', async () => {
    const response = await signUp('Ada', `${newId()}@x.example`)
    const [name, signed] = cookieOf(response).split('=') as [string, string]
    const token = decodeURIComponent(signed).split('.')[0] ?? ''
    for (const cookie of ['', `${name}=${token}`, `${name}=${token}.AAAA`, `${name}=x.y`])
      expect((await contextFrom(new Headers({ cookie }))).userId).toBeNull()
    await db
      .update(session)
      .set({ expiresAt: new Date(Date.now() - 1000) })
      .where(eq(session.token, token))
    expect((await whoIs(response)).userId).toBeNull()
  })

  it('from another site is refused', async () => {
    const email = `${newId()}@x.example`
    const response = await signUp('Ada', email)
    const headers = { origin: 'https://elsewhere.example', cookie: cookieOf(response) }
    expect((await post('/sign-out', {}, headers)).status).toBe(403)
    expect((await whoIs(response)).userId).not.toBeNull()
  })

  it.each(['http://127.0.0.1:3000', 'http://localhost:3000'])('works from %s on one machine', async (from) => {
    const response = await signUp('Ada', `${newId()}@x.example`)
    expect((await post('/sign-out', {}, { origin: from, cookie: cookieOf(response) })).status).toBe(200)
  })
})

describe("better-auth's other calls", () => {
  it.each([
    '/organization/create',
    '/organization/update-member-role',
    '/organization/invite-member',
    '/update-user',
    '/delete-user',
  ])('are not there: %s', async (path) => {
    const response = await signUp('Ada', `${newId()}@x.example`)
    expect((await post(path, { name: 'x', slug: 'x' }, { cookie: cookieOf(response) })).status).toBe(404)
  })
})
