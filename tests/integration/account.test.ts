import { eq } from 'drizzle-orm'
import { describe, expect, it } from 'vitest'
import { db } from '@/db/client'
import { session, user, verification } from '@/db/schema/account'
import { changeName } from '@/lib/data/account/change-name'
import { endOtherSessions } from '@/lib/data/account/end-other-sessions'
import { endSession } from '@/lib/data/account/end-session'
import { getAccount } from '@/lib/data/account/get-account'
import { listMySessions } from '@/lib/data/account/list-my-sessions'
import { kindsTo, mailsTo, newAddress, tokenMailedTo } from './post-box'
import { codeFrom, password, signedUp, Visitor } from './visitor'
import { codeOf, value } from './world'

const another = 'another long password'
const statuses = (responses: Response[]) => responses.map(({ status }) => status)

describe('a name', () => {
  it('can be changed', async () => {
    const { email, at } = await signedUp('Ada')
    value(await changeName(await at.context(), { name: '  Ada Lovelace ' }))
    expect(value(await getAccount(await at.context(), {}))).toMatchObject({ name: 'Ada Lovelace', email })
  })

  it.each(['', '  ', 'x'.repeat(101), 'a\nb', 'a\u0000b'])('cannot be "%s"', async (name) => {
    const { at } = await signedUp('Ada')
    expect(codeOf(await changeName(await at.context(), { name }))).toBe('badInput')
  })
})

describe('a password', () => {
  it('is changed with the present one, ends all other sessions, and is told by mail', async () => {
    const { email, at } = await signedUp()
    const elsewhere = new Visitor()
    await elsewhere.signIn(email)
    const change = (currentPassword: string, newPassword = another) =>
      at.post('/change-password', { currentPassword, newPassword, revokeOtherSessions: false })
    expect(statuses([await change('not the right one'), await change(password, 'short')])).toEqual([400, 400])
    expect(await elsewhere.isSignedIn()).toBe(true)
    expect((await change(password)).status).toBe(200)
    expect([await at.isSignedIn(), await elsewhere.isSignedIn()]).toEqual([true, false])
    expect(statuses([await new Visitor().signIn(email), await new Visitor().signIn(email, another)])).toEqual([
      401, 200,
    ])
    expect(await mailsTo(email)).toMatchObject([{ kind: 'securityNotice', event: 'passwordChanged' }, {}])
  })

  it('is not changed by who is signed out', async () => {
    const body = { currentPassword: password, newPassword: another }
    expect((await new Visitor().post('/change-password', body)).status).toBe(401)
  })
})

describe('a lost password', () => {
  const ask = (email: string) => new Visitor().post('/request-password-reset', { email })
  const choose = (token: string, newPassword = another) => new Visitor().post('/reset-password', { token, newPassword })

  it('is replaced once by a mailed link, which ends every session', async () => {
    const { email, at } = await signedUp()
    await ask(email)
    const token = await tokenMailedTo(email)
    expect((await choose(token, 'short')).status).toBe(400)
    expect((await choose(token)).status).toBe(200)
    expect(await at.isSignedIn()).toBe(false)
    expect(statuses([await new Visitor().signIn(email), await new Visitor().signIn(email, another)])).toEqual([
      401, 200,
    ])
    const again = await choose(token, 'a third long password')
    expect([again.status, await codeFrom(again)]).toEqual([400, 'INVALID_TOKEN'])
    expect(await kindsTo(email)).toEqual(['securityNotice', 'resetPassword', 'verifyAddress'])
  })

  it('is replaced by one of two who use a link at the same moment', async () => {
    const { email } = await signedUp()
    await ask(email)
    const token = await tokenMailedTo(email)
    const both = statuses(await Promise.all([choose(token, `${another} A`), choose(token, `${another} B`)]))
    expect(both.sort()).toEqual([200, 400])
  })

  it('is not replaced by a guessed link, an old one, or one of before the password was changed', async () => {
    const { email, at } = await signedUp()
    const { userId } = await at.context()
    expect((await choose('AAAAAAAAAAAAAAAAAAAAAAAA')).status).toBe(400)
    await ask(email)
    const mine = eq(verification.value, userId ?? '')
    await db
      .update(verification)
      .set({ expiresAt: new Date(Date.now() - 1000) })
      .where(mine)
    expect((await choose(await tokenMailedTo(email))).status).toBe(400)
    await ask(email)
    const token = await tokenMailedTo(email)
    await at.post('/change-password', { currentPassword: password, newPassword: another })
    expect((await choose(token, 'a third long password')).status).toBe(400)
    expect((await new Visitor().signIn(email, another)).status).toBe(200)
  })

  it('keeps the token as a hash only', async () => {
    const { email, at } = await signedUp()
    await ask(email)
    const token = await tokenMailedTo(email)
    const { userId } = await at.context()
    const kept = await db
      .select()
      .from(verification)
      .where(eq(verification.value, userId ?? ''))
    expect(kept).toHaveLength(1)
    expect(JSON.stringify(kept)).not.toContain(token)
  })

  it('confirms the address along the way: the link was mailed to it', async () => {
    const email = newAddress()
    await new Visitor().signUp(email)
    await ask(email)
    await choose(await tokenMailedTo(email))
    expect((await new Visitor().signIn(email, another)).status).toBe(200)
  })
})

describe('an address', () => {
  const change = (at: Visitor, newEmail: string, secret?: string) =>
    at.post('/change-email', { newEmail, ...(secret !== undefined && { password: secret }) })

  it('is changed with the password and a link to the new one; the old one is told', async () => {
    const { email, at } = await signedUp()
    const fresh = newAddress()
    expect(statuses([await change(at, fresh), await change(at, fresh, 'not the right one')])).toEqual([400, 400])
    expect(await mailsTo(fresh)).toEqual([])
    expect((await change(at, fresh, password)).status).toBe(200)
    expect((await new Visitor().signIn(fresh)).status).toBe(401)
    const token = await tokenMailedTo(fresh)
    await new Visitor().post('/request-password-reset', { email })
    const reset = await tokenMailedTo(email)
    expect((await new Visitor().confirm(token)).status).toBe(200)
    expect(statuses([await new Visitor().signIn(email), await new Visitor().signIn(fresh)])).toEqual([401, 200])
    expect((await mailsTo(email))[0]).toMatchObject({ kind: 'addressChanged', newAddress: fresh })
    // What still lies in the old mailbox opens nothing.
    expect((await new Visitor().post('/reset-password', { token: reset, newPassword: another })).status).toBe(400)
    expect((await new Visitor().confirm(token)).status).toBe(401)
  })

  it('of somebody else cannot be taken, and it is not told that there is one', async () => {
    const [{ at }, { email: taken }] = [await signedUp(), await signedUp()]
    const answers = [await change(at, taken, password), await change(at, newAddress(), password)]
    expect(statuses(answers)).toEqual([200, 200])
    expect(await answers[0]?.text()).toBe(await answers[1]?.text())
    expect(await kindsTo(taken)).toEqual(['verifyAddress'])
  })

  it('that got an account in the meantime is refused in words', async () => {
    const { email, at } = await signedUp()
    const fresh = newAddress()
    await change(at, fresh, password)
    const token = await tokenMailedTo(fresh)
    await signedUp('Grace', fresh)
    const late = await at.confirm(token)
    expect([late.status, await codeFrom(late)]).toEqual([400, 'ADDRESS_TAKEN'])
    const [kept] = await db.select().from(user).where(eq(user.email, email))
    expect(kept?.name).toBe('Ada')
  })
})

describe('sessions', () => {
  it('are listed without their secrets, and ended one by one', async () => {
    const { email, at } = await signedUp()
    const elsewhere = new Visitor()
    await elsewhere.post('/sign-in/email', { email, password }, { 'user-agent': 'Elsewhere/1.0' })
    const ctx = await at.context()
    const mine = value(await listMySessions(ctx, {}))
    expect(mine.map(({ isThis, userAgent }) => [isThis, userAgent]).sort()).toEqual([
      [false, 'Elsewhere/1.0'],
      [true, ''],
    ])
    const secrets = await db
      .select({ token: session.token })
      .from(session)
      .where(eq(session.userId, ctx.userId ?? ''))
    for (const { token } of secrets) expect(JSON.stringify(mine)).not.toContain(token)
    value(await endSession(ctx, { session: mine.find(({ isThis }) => !isThis)?.id ?? '' }))
    expect([await at.isSignedIn(), await elsewhere.isSignedIn()]).toEqual([true, false])
  })

  it('of others cannot be ended', async () => {
    const [{ at }, { at: other }] = [await signedUp(), await signedUp()]
    const [theirs] = value(await listMySessions(await other.context(), {}))
    expect(codeOf(await endSession(await at.context(), { session: theirs?.id ?? '' }))).toBe('notFound')
    expect(await other.isSignedIn()).toBe(true)
  })

  it('can be ended all but this one, which is told by mail', async () => {
    const { email, at } = await signedUp()
    const others = [new Visitor(), new Visitor()]
    for (const other of others) await other.signIn(email)
    expect(value(await endOtherSessions(await at.context(), {}))).toEqual({ ended: 2 })
    expect(await Promise.all([at, ...others].map((visitor) => visitor.isSignedIn()))).toEqual([true, false, false])
    expect((await mailsTo(email))[0]).toMatchObject({ kind: 'securityNotice', event: 'sessionsEnded' })
    expect(value(await endOtherSessions(await at.context(), {}))).toEqual({ ended: 0 })
    expect(await kindsTo(email)).toEqual(['securityNotice', 'verifyAddress'])
  })
})
