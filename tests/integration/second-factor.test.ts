import { eq } from 'drizzle-orm'
import { describe, expect, it } from 'vitest'
import { db } from '@/db/client'
import { twoFactor } from '@/db/schema/account'
import { getAccount } from '@/lib/data/account/get-account'
import { codeFor } from './authenticator'
import { mailsTo, tokenMailedTo } from './post-box'
import { codeFrom, password, signedUp, Visitor } from './visitor'
import { value } from './world'

type Enabled = { totpURI: string; backupCodes: string[] }

const enable = (at: Visitor, secret = password) => at.post('/two-factor/enable', { password: secret })
const typeCode = (at: Visitor, code: string) => at.post('/two-factor/verify-totp', { code })
const typeBackup = (at: Visitor, code: string) => at.post('/two-factor/verify-backup-code', { code })
const has = async (at: Visitor) => value(await getAccount(await at.context(), {})).hasSecondFactor

async function withSecondFactor() {
  const { email, at } = await signedUp()
  const enabled = (await (await enable(at)).json()) as Enabled
  const typed = await typeCode(at, codeFor(enabled.totpURI))
  if (typed.status !== 200) throw new Error(await typed.text())
  return { email, at, ...enabled }
}

const wrongCode = (uri: string) => String((Number(codeFor(uri)) + 500_000) % 1_000_000).padStart(6, '0')

describe('a second factor', () => {
  it('is turned on with the password and a first code, and is told by mail', async () => {
    const { email, at } = await signedUp()
    expect((await enable(at, 'not the right one')).status).toBe(400)
    const { totpURI, backupCodes } = (await (await enable(at)).json()) as Enabled
    const address = new URL(totpURI)
    expect([address.protocol, address.searchParams.get('issuer')]).toEqual(['otpauth:', 'Tallybrook'])
    expect(decodeURIComponent(address.pathname)).toContain(email)
    expect(new Set(backupCodes).size).toBe(10)
    // Until a first code was right, signing in asks for none.
    expect(await has(at)).toBe(false)
    const meanwhile = new Visitor()
    await meanwhile.signIn(email)
    expect(await meanwhile.isSignedIn()).toBe(true)
    expect((await typeCode(at, wrongCode(totpURI))).status).toBe(401)
    expect(await has(at)).toBe(false)
    expect((await typeCode(at, codeFor(totpURI))).status).toBe(200)
    expect(await has(at)).toBe(true)
    expect((await mailsTo(email))[0]).toMatchObject({ kind: 'securityNotice', event: 'secondFactorOn' })
  })

  it('is asked for at sign-in: the password alone signs nobody in', async () => {
    const { email, totpURI } = await withSecondFactor()
    const at = new Visitor()
    const response = await at.signIn(email)
    expect(await response.json()).toMatchObject({ twoFactorRedirect: true, twoFactorMethods: ['totp'] })
    expect(await at.isSignedIn()).toBe(false)
    expect((await typeCode(at, wrongCode(totpURI))).status).toBe(401)
    expect((await typeCode(new Visitor(), codeFor(totpURI))).status).toBe(401)
    expect((await typeCode(at, codeFor(totpURI))).status).toBe(200)
    expect(await at.isSignedIn()).toBe(true)
    const kinds = (await mailsTo(email)).map((mail) => ('event' in mail ? mail.event : mail.kind))
    expect(kinds).toEqual(['secondFactorOn', 'verifyAddress'])
  })

  it('is asked for every time: no device is trusted, even where that is asked for', async () => {
    const { email, totpURI } = await withSecondFactor()
    const at = new Visitor()
    await at.signIn(email)
    await at.post('/two-factor/verify-totp', { code: codeFor(totpURI), trustDevice: true })
    await at.post('/sign-out')
    await at.signIn(email)
    expect(await at.isSignedIn()).toBe(false)
  })

  it('cannot be tried without end: the challenge ends after five wrong codes', async () => {
    const { email, totpURI } = await withSecondFactor()
    const at = new Visitor()
    await at.signIn(email)
    for (let look = 0; look < 5; look++) expect((await typeCode(at, wrongCode(totpURI))).status).toBe(401)
    const late = await typeCode(at, codeFor(totpURI))
    expect([late.status, await codeFrom(late)]).toEqual([400, 'TOO_MANY_ATTEMPTS_REQUEST_NEW_CODE'])
    expect(await at.isSignedIn()).toBe(false)
  })

  it('can be stood in for by each backup code once', async () => {
    const { email, backupCodes } = await withSecondFactor()
    const [first = '', second = ''] = backupCodes
    const at = new Visitor()
    await at.signIn(email)
    expect((await typeBackup(at, 'AAAAA-AAAAA')).status).toBe(401)
    expect((await typeBackup(at, first)).status).toBe(200)
    expect(await at.isSignedIn()).toBe(true)
    const later = new Visitor()
    await later.signIn(email)
    expect((await typeBackup(later, first)).status).toBe(401)
    expect((await typeBackup(later, second)).status).toBe(200)
  })

  it('gets new backup codes with the password; the former ones end', async () => {
    const { email, at, backupCodes } = await withSecondFactor()
    const renew = (secret: string) => at.post('/two-factor/generate-backup-codes', { password: secret })
    expect((await renew('not the right one')).status).toBe(400)
    const fresh = ((await (await renew(password)).json()) as Enabled).backupCodes
    const later = new Visitor()
    await later.signIn(email)
    expect((await typeBackup(later, backupCodes[0] ?? '')).status).toBe(401)
    expect((await typeBackup(later, fresh[0] ?? '')).status).toBe(200)
  })

  it('is turned off with the password, and is told by mail', async () => {
    const { email, at } = await withSecondFactor()
    const disable = (secret: string) => at.post('/two-factor/disable', { password: secret })
    expect((await disable('not the right one')).status).toBe(400)
    expect(await has(at)).toBe(true)
    expect((await disable(password)).status).toBe(200)
    expect((await mailsTo(email))[0]).toMatchObject({ kind: 'securityNotice', event: 'secondFactorOff' })
    const later = new Visitor()
    await later.signIn(email)
    expect(await later.isSignedIn()).toBe(true)
  })

  it('is still asked for after the password was reset', async () => {
    const { email } = await withSecondFactor()
    await new Visitor().post('/request-password-reset', { email })
    const token = await tokenMailedTo(email)
    await new Visitor().post('/reset-password', { token, newPassword: 'another long password' })
    const at = new Visitor()
    expect((await at.signIn(email, 'another long password')).status).toBe(200)
    expect(await at.isSignedIn()).toBe(false)
  })

  it('is kept encrypted', async () => {
    const { at, totpURI, backupCodes } = await withSecondFactor()
    const { userId } = await at.context()
    const [kept] = await db
      .select()
      .from(twoFactor)
      .where(eq(twoFactor.userId, userId ?? ''))
    const text = JSON.stringify(kept)
    for (const secret of [new URL(totpURI).searchParams.get('secret') ?? '', ...backupCodes])
      expect(text).not.toContain(secret)
  })

  it.each(['enable', 'disable', 'generate-backup-codes'])('is nothing that who is signed out can %s', async (call) => {
    expect((await new Visitor().post(`/two-factor/${call}`, { password })).status).toBe(401)
  })
})
