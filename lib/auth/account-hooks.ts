import { APIError, createAuthMiddleware, getSessionFromCtx, isAPIError } from 'better-auth/api'
import { eq } from 'drizzle-orm'
import { db } from '@/db/client'
import { user, verification } from '@/db/schema/account'
import { env } from '@/lib/env'
import { mailAddressChanged, mailNotice } from './account-mail'
import { countAttempt, forgetAttempts } from './attempts'
import { nameProblem } from './person-name'

type Person = { id: string; name: string; email: string }

const refused = (code: string, message: string) => new APIError('BAD_REQUEST', { code, message })
const tooMany = () =>
  new APIError('TOO_MANY_REQUESTS', {
    code: 'TOO_MANY_TRIES',
    message: 'Too many wrong passwords for this address. Wait a quarter of an hour, or choose a new password.',
  })

/** What better-auth's calls are asked to check or to do beyond what they do by themselves; by path. */
export const beforeCall = createAuthMiddleware(async (ctx) => {
  const body: Record<string, unknown> = ctx.body ?? {}
  switch (ctx.path) {
    case '/sign-up/email':
      return { context: { body: { name: checkSignUp(body) } } }
    case '/sign-in/email':
      // Counted before it is known whether it is wrong, so that many at once are all counted.
      if (!env.isTest && !(await countAttempt('signIn', String(body.email)))) throw tooMany()
      return
    case '/change-password':
      return { context: { body: { revokeOtherSessions: true } } }
    case '/change-email': {
      // Whoever finds a browser signed in could otherwise take the account along.
      const session = await getSessionFromCtx(ctx)
      if (session) await ctx.context.password.checkPassword(session.user.id, ctx)
      return
    }
    case '/two-factor/verify-totp':
    case '/two-factor/verify-backup-code':
      return { context: { body: { trustDevice: false, disableSession: false } } }
    case '/verify-email': {
      const change = addressChange(ctx.query?.token)
      if (change && (await isOfAnother(change)))
        throw refused('ADDRESS_TAKEN', 'This address has an account of its own by now. Choose another one.')
      return
    }
  }
})

export const afterCall = createAuthMiddleware(async (ctx) => {
  const { returned, newSession } = ctx.context
  if (isAPIError(returned)) return
  switch (ctx.path) {
    case '/sign-up/email':
      // The same answer for an address that has an account, which was not changed, as for one that has just got one.
      return ctx.json({ token: null, user: null })
    case '/sign-in/email':
      return forgetAttempts('signIn', String(ctx.body?.email))
    case '/change-password':
      return settleNewPassword((returned as { user: Person }).user)
    case '/two-factor/verify-totp': {
      // With it a new session: it was the first code, or somebody signed in with one; told apart by the person before.
      const { user: before } = returned as { user: Person & { twoFactorEnabled?: boolean | null } }
      if (newSession && !before.twoFactorEnabled) await mailNotice(before, 'secondFactorOn')
      return
    }
    case '/two-factor/disable':
      if (newSession) await mailNotice(newSession.user, 'secondFactorOff')
      return
    case '/verify-email': {
      const change = addressChange(ctx.query?.token)
      const { user: person } = returned as { user: Person | null }
      if (!change || !person) return
      await forgetMailedLinks(person.id)
      return mailAddressChanged({ name: person.name, email: change.from }, change.to)
    }
  }
})

/** After a password was changed or reset: it is told by mail, and links for choosing another one are worth nothing. */
export async function settleNewPassword({ id, name, email }: Person): Promise<void> {
  await forgetMailedLinks(id)
  await forgetAttempts('signIn', email)
  await mailNotice({ name, email }, 'passwordChanged')
}

const forgetMailedLinks = (userId: string) => db.delete(verification).where(eq(verification.value, userId))

/** The name as it will be kept. Whatever is wrong is said before it is looked whether the address has an account. */
function checkSignUp(body: Record<string, unknown>): string {
  const known = ['name', 'email', 'password', 'callbackURL', 'rememberMe']
  if (Object.keys(body).some((key) => !known.includes(key)))
    throw refused('INVALID_FIELD', 'Send a name, an e-mail address and a password, and nothing else.')
  const name = typeof body.name === 'string' ? body.name.trim() : ''
  const problem = nameProblem(name)
  if (problem) throw refused('INVALID_NAME', problem)
  if (typeof body.email === 'string' && body.email.length > 254)
    throw refused('INVALID_EMAIL', 'This e-mail address is longer than 254 characters')
  return name
}

async function isOfAnother({ userId, to }: AddressChange): Promise<boolean> {
  const [holder] = await db.select({ id: user.id }).from(user).where(eq(user.email, to))
  return holder !== undefined && holder.id !== userId
}

type AddressChange = { userId: string; from: string; to: string }

/** From which address to which a mailed token changes; what it says is believed only once better-auth has taken it. */
function addressChange(token: unknown): AddressChange | null {
  if (typeof token !== 'string') return null
  try {
    const claims = JSON.parse(Buffer.from(token.split('.')[1] ?? '', 'base64url').toString('utf8'))
    const { userId, email: from, updateTo: to } = claims as Record<string, unknown>
    const isChange = typeof userId === 'string' && typeof from === 'string' && typeof to === 'string'
    return isChange ? { userId, from, to } : null
  } catch {
    return null
  }
}
