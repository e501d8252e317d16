import { eq, sql } from 'drizzle-orm'
import { afterEach, describe, expect, it } from 'vitest'
import { db } from '@/db/client'
import { account, session, user } from '@/db/schema/account'
import { contextFrom } from '@/lib/auth/context'
import { newId } from '@/lib/book/ids'
import { listProjects } from '@/lib/data/project/list-projects'
import { listMyTeams } from '@/lib/data/team/list-my-teams'
import { kindsTo, mailsTo, newAddress, tokenMailedTo } from './post-box'
import { codeFrom, password, signedUp, Visitor } from './visitor'
import { codeOf, value } from './world'

const myTeams = async (visitor: Visitor) => value(await listMyTeams(await visitor.context(), {}))
const personOf = async (email: string) => (await db.select().from(user).where(eq(user.email, email)))[0]

describe('signing up', () => {
  it('makes a team with a first project', async () => {
    const { at } = await signedUp('  Ada Lovelace ')
    const [mine, ...others] = await myTeams(at)
    expect(others).toEqual([])
    expect(mine).toMatchObject({ name: "Ada Lovelace's team", role: 'owner' })
    expect(mine?.slug).toMatch(/^ada-lovelace(-|$)/)
    expect(value(await listProjects(await at.context(), { team: mine?.slug ?? '' }))).toMatchObject([
      { name: 'First project', bookCount: 0 },
    ])
  })

  it('gives people of one name addresses of their own, even at one moment', async () => {
    const name = `Grace ${newId()}`
    const people = await Promise.all(Array.from({ length: 6 }, () => signedUp(name)))
    const slugs = await Promise.all(people.map(async ({ at }) => (await myTeams(at))[0]?.slug))
    expect(new Set(slugs).size).toBe(6)
    expect(slugs).not.toContain(undefined)
  })

  it.each(['山田 太郎', 'API', 'Sign In', '_next'])('gives %s an address that is no page of ours', async (name) => {
    const [mine] = await myTeams((await signedUp(name)).at)
    expect(mine?.slug).toMatch(/team|^next-/)
  })

  it.each([
    ['an empty name', '  ', /Type your name/],
    ['a name with a line break', 'Ada\nLovelace', /cannot be shown/],
    ['a very long name', 'x'.repeat(101), /longer than 100/],
  ])('refuses %s in a plain sentence', async (_, name, sentence) => {
    const email = newAddress()
    const response = await new Visitor().signUp(email, name)
    expect(response.status).toBe(400)
    expect(((await response.json()) as { message: string }).message).toMatch(sentence)
    expect(await personOf(email)).toBeUndefined()
  })

  it('refuses a short password, and what is not asked for', async () => {
    expect((await new Visitor().signUp(newAddress(), 'Ada', 'short')).status).toBe(400)
    const more = { name: 'Ada', email: newAddress(), password, emailVerified: true, image: 'https://x.example/a.png' }
    expect((await new Visitor().post('/sign-up/email', more)).status).toBe(400)
    expect(await personOf(more.email)).toBeUndefined()
  })

  describe('when the team cannot be made', () => {
    afterEach(() => db.execute(sql`drop trigger if exists no_projects on project`))

    it('leaves no account behind, and can be tried again', async () => {
      const email = newAddress()
      const name = `Mary ${newId()}`
      await db.execute(
        sql`create or replace function refuse() returns trigger as $$ begin raise 'refused'; end $$ language plpgsql`,
      )
      await db.execute(sql`create trigger no_projects before insert on project for each row execute function refuse()`)
      const response = await new Visitor().signUp(email, name)
      expect(response.status).toBe(500)
      expect(((await response.json()) as { error: { message: string } }).error.message).toMatch(
        /went wrong on our side/,
      )
      expect(await personOf(email)).toBeUndefined()
      await db.execute(sql`drop trigger no_projects on project`)
      expect((await new Visitor().signUp(email, name)).status).toBe(200)
    })
  })
})

describe('an address', () => {
  it('has to be confirmed before anybody signs in with it; the password is asked for after that', async () => {
    const email = newAddress()
    const at = new Visitor()
    await at.signUp(email)
    expect(await kindsTo(email)).toEqual(['verifyAddress'])
    const early = await at.signIn(email)
    expect([early.status, await codeFrom(early)]).toEqual([403, 'EMAIL_NOT_VERIFIED'])
    expect(await kindsTo(email)).toEqual(['verifyAddress', 'verifyAddress'])
    expect((await new Visitor().signIn(email, 'not the right one')).status).toBe(401)
    expect((await at.confirm(await tokenMailedTo(email))).status).toBe(200)
    expect(await at.isSignedIn()).toBe(false)
    expect((await at.signIn(email)).status).toBe(200)
    expect(await at.isSignedIn()).toBe(true)
  })

  it('is confirmed on the way to where one wanted to go, if that is a page of ours', async () => {
    const linkFor = async (callbackURL: string) => {
      const email = newAddress()
      const { status } = await new Visitor().post('/sign-up/email', { name: 'Ada', email, password, callbackURL })
      const [mail] = await mailsTo(email)
      return mail && 'path' in mail ? new URL(mail.path, 'http://here.test').searchParams.get('next') : status
    }
    expect(await linkFor('/invitation?token=x')).toBe('/invitation?token=x')
    expect(await linkFor('/')).toBeNull()
    expect(await linkFor('https://elsewhere.example/')).toBe(403)
  })

  it('is not confirmed by a guessed, cut or foreign link', async () => {
    const [mine, other] = [newAddress(), newAddress()]
    await new Visitor().signUp(mine)
    await new Visitor().signUp(other)
    const token = await tokenMailedTo(mine)
    const [head, , seal] = token.split('.')
    const claims = Buffer.from(JSON.stringify({ email: other })).toString('base64url')
    for (const wrong of ['x', token.slice(0, -2), `${head}.${claims}.${seal}`])
      expect((await new Visitor().confirm(wrong)).status, wrong).toBe(401)
    await new Visitor().confirm(token)
    expect([(await personOf(mine))?.emailVerified, (await personOf(other))?.emailVerified]).toEqual([true, false])
  })

  it('can be sent the link again, and is not told apart from one that has no account', async () => {
    const { email } = await signedUp()
    const waiting = newAddress()
    await new Visitor().signUp(waiting)
    const answers = await Promise.all(
      [email, waiting, newAddress()].map(async (address) => {
        const response = await new Visitor().post('/send-verification-email', { email: address })
        return [response.status, await response.text()]
      }),
    )
    expect(new Set(answers.map(String)).size).toBe(1)
    expect(await kindsTo(waiting)).toEqual(['verifyAddress', 'verifyAddress'])
    expect(await kindsTo(email)).toEqual(['verifyAddress'])
  })
})

describe('an address that has an account', () => {
  const timed = async (ask: () => Promise<Response>) => {
    const from = performance.now()
    const response = await ask()
    const { date: _, 'x-request-id': __, ...headers } = Object.fromEntries(response.headers)
    return { ms: performance.now() - from, said: [response.status, headers, await response.text()] }
  }
  const pairs = async (ask: (address: string) => Promise<Response>) => {
    const { email } = await signedUp()
    const known = await timed(() => ask(email))
    const unknown = await timed(() => ask(newAddress()))
    return { known, unknown }
  }

  it.each<[string, (email: string) => Promise<Response>]>([
    ['signing up', (email) => new Visitor().signUp(email, '  Eve ')],
    ['signing up with a bad name', (email) => new Visitor().signUp(email, '')],
    ['signing up with a short password', (email) => new Visitor().signUp(email, 'Eve', 'x')],
    ['signing in', (email) => new Visitor().signIn(email, 'not the right one')],
    ['asking for a new password', (email) => new Visitor().post('/request-password-reset', { email })],
  ])('is not told by %s', async (_, ask) => {
    const { known, unknown } = await pairs(ask)
    expect(known.said).toEqual(unknown.said)
  })

  it('is not told by how long it takes to sign up or to ask for a new password', async () => {
    const asks = [
      [(email: string) => new Visitor().signUp(email), 600],
      [(email: string) => new Visitor().post('/request-password-reset', { email }), 400],
    ] as const
    for (const [ask, least] of asks) {
      const { known, unknown } = await pairs(ask)
      expect(Math.min(known.ms, unknown.ms)).toBeGreaterThanOrEqual(least - 5)
    }
  })

  it('is told to its mailbox alone, and keeps its password and its name', async () => {
    const { email } = await signedUp('Ada')
    await new Visitor().signUp(email, 'Eve', 'some other password')
    expect(await mailsTo(email)).toMatchObject([
      { kind: 'alreadyRegistered', name: 'Ada', signInPath: '/sign-in' },
      { kind: 'verifyAddress' },
    ])
    expect((await new Visitor().signIn(email, 'some other password')).status).toBe(401)
    expect((await new Visitor().signIn(email)).status).toBe(200)
    expect((await personOf(email))?.name).toBe('Ada')
  })

  it('but never confirmed it gets the link again', async () => {
    const email = newAddress()
    await new Visitor().signUp(email)
    await new Visitor().signUp(email)
    expect(await kindsTo(email)).toEqual(['verifyAddress', 'verifyAddress'])
    const at = new Visitor()
    await at.confirm(await tokenMailedTo(email))
    expect((await at.signIn(email)).status).toBe(200)
  })
})

describe('signing in', () => {
  it('needs the right password, and keeps only a hash of it', async () => {
    const { email } = await signedUp()
    expect((await new Visitor().signIn(email, 'not the right one')).status).toBe(401)
    const at = new Visitor()
    const response = await at.signIn(email)
    expect(response.status).toBe(200)
    expect(response.headers.get('set-cookie')).toMatch(/HttpOnly; SameSite=Lax/)
    const { userId } = await at.context()
    const [kept] = await db
      .select()
      .from(account)
      .where(eq(account.userId, userId ?? ''))
    expect(kept?.password).not.toContain(password)
  })

  it('ends with signing out', async () => {
    const { at } = await signedUp()
    const before = await at.context()
    const headers = new Headers({ cookie: at.cookie })
    expect((await at.post('/sign-out')).status).toBe(200)
    const after = await contextFrom(headers)
    expect(after.userId).toBeNull()
    expect(codeOf(await listMyTeams(after, {}))).toBe('signedOut')
    const left = await db
      .select()
      .from(session)
      .where(eq(session.userId, before.userId ?? ''))
    expect(left).toEqual([])
  })

  it('is not taken from a forged or an ended cookie', async () => {
    const { at } = await signedUp()
    const pair = at.cookie.split('; ').find((cookie) => cookie.includes('session_token')) ?? ''
    const [name, signed] = pair.split('=') as [string, string]
    const token = decodeURIComponent(signed).split('.')[0] ?? ''
    for (const cookie of ['', `${name}=${token}`, `${name}=${token}.AAAA`, `${name}=x.y`])
      expect((await contextFrom(new Headers({ cookie }))).userId).toBeNull()
    await db
      .update(session)
      .set({ expiresAt: new Date(Date.now() - 1000) })
      .where(eq(session.token, token))
    expect(await at.isSignedIn()).toBe(false)
  })

  it('from another site is refused', async () => {
    const { at } = await signedUp()
    expect((await at.post('/sign-out', {}, { origin: 'https://elsewhere.example' })).status).toBe(403)
    expect(await at.isSignedIn()).toBe(true)
  })

  it.each(['http://127.0.0.1:3000', 'http://localhost:3000'])('works from %s on one machine', async (from) => {
    const { at } = await signedUp()
    expect((await at.post('/sign-out', {}, { origin: from })).status).toBe(200)
  })
})

describe("better-auth's other calls", () => {
  it.each([
    '/organization/create',
    '/organization/update-member-role',
    '/organization/invite-member',
    '/update-user',
    '/update-session',
    '/delete-user',
    '/set-password',
    '/two-factor/get-totp-uri',
    '/two-factor/view-backup-codes',
    '/revoke-sessions',
  ])('are not there: %s', async (path) => {
    const { at } = await signedUp()
    expect((await at.post(path, { name: 'x', slug: 'x' })).status).toBe(404)
  })
})
