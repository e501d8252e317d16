import { betterAuth } from 'better-auth'
import { drizzleAdapter } from 'better-auth/adapters/drizzle'
import { APIError, createEmailVerificationToken } from 'better-auth/api'
import { nextCookies } from 'better-auth/next-js'
import { organization, twoFactor as secondFactor } from 'better-auth/plugins'
import { eq } from 'drizzle-orm'
import { db } from '@/db/client'
import { account, rateLimit, session, twoFactor, user, verification } from '@/db/schema/account'
import { invitation, member, team } from '@/db/schema/team'
import { env } from '@/lib/env'
import { logger } from '@/lib/http/logger'
import { afterCall, beforeCall, settleNewPassword } from './account-hooks'
import { confirmFor, mailAlreadyRegistered, mailConfirmation, mailReset, resetFor } from './account-mail'
import { makeFirstTeam } from './first-team'
import { organisationAccess, organisationRoles } from './organisation-access'
import { longestPassword, shortestPassword } from './password'
import { nameProblem } from './person-name'
import { authDatabase, authTransaction } from './shared-transaction'
import { trustedOrigins } from './trusted-origins'

const day = 24 * 60 * 60

const confirmationToken = ({ id, email }: { id: string; email: string }) =>
  createEmailVerificationToken(env.authSecret, email, undefined, confirmFor, { userId: id })

/** Who somebody is. What they may do is decided by permissions.ts, in the verbs of lib/data. */
export const auth = betterAuth({
  appName: 'Tallybrook',
  baseURL: env.authUrl,
  secret: env.authSecret,
  trustedOrigins: trustedOrigins(env.authUrl, env.isLocal),
  telemetry: { enabled: false },
  logger: { level: 'warn', log: (level, message, ...more) => logger()[level]({ more }, message) },
  database: drizzleAdapter(authDatabase, {
    provider: 'pg',
    schema: { user, session, account, verification, rateLimit, twoFactor, team, member, invitation },
    transaction: true,
  }),
  emailAndPassword: {
    enabled: true,
    // Nobody signs in with an address they have not confirmed. So signing up can give one answer to everybody, and what
    // an address has (an account or none) is told to its mailbox alone.
    requireEmailVerification: true,
    autoSignIn: false,
    minPasswordLength: shortestPassword,
    maxPasswordLength: longestPassword,
    onExistingUserSignUp: async ({ user: person }) => {
      if (person.emailVerified) await mailAlreadyRegistered(person)
      else await mailConfirmation(person, await confirmationToken(person))
    },
    resetPasswordTokenExpiresIn: resetFor,
    revokeSessionsOnPasswordReset: true,
    sendResetPassword: ({ user: person, token }) => mailReset(person, token),
    onPasswordReset: async ({ user: person }) => {
      // The link was mailed to the address: whoever used it reads its mail.
      await db.update(user).set({ emailVerified: true }).where(eq(user.id, person.id))
      await settleNewPassword(person)
    },
  },
  emailVerification: {
    sendOnSignUp: true,
    sendOnSignIn: true,
    // Whoever confirms an address may not be who made the account with it: the password is asked for.
    autoSignInAfterVerification: false,
    expiresIn: confirmFor,
    sendVerificationEmail: ({ user: person, token, url }) => mailConfirmation(person, token, url),
  },
  user: { changeEmail: { enabled: true } },
  // Tokens of links are kept as hashes.
  verification: { storeIdentifier: 'hashed' },
  hooks: { before: beforeCall, after: afterCall },
  session: { expiresIn: 14 * day, updateAge: day },
  // Said outright: better-auth leaves these checks out where NODE_ENV is test, and tests should meet them.
  advanced: { disableOriginCheck: false, disableCSRFCheck: false },
  rateLimit: { enabled: !env.isTest, storage: 'database', window: 60, max: 120 },
  databaseHooks: {
    user: {
      create: {
        before: async (person) => {
          const problem = nameProblem(person.name)
          if (problem) throw new APIError('BAD_REQUEST', { code: 'INVALID_NAME', message: problem })
          return { data: { ...person, name: person.name.trim() } }
        },
      },
    },
    account: {
      create: {
        // Not in user.create.after: that runs when the account is committed, and could leave a person without a team.
        before: async (account) => {
          const tx = authTransaction()
          if (!tx) throw new Error('An account is made outside a transaction')
          await makeFirstTeam(tx, account.userId)
        },
      },
    },
  },
  plugins: [
    organization({
      ac: organisationAccess,
      roles: organisationRoles,
      creatorRole: 'owner',
      allowUserToCreateOrganization: false,
      disableOrganizationDeletion: true,
      schema: {
        session: { fields: { activeOrganizationId: 'activeTeamId' } },
        organization: { modelName: 'team' },
        member: { fields: { organizationId: 'teamId' } },
        invitation: { fields: { organizationId: 'teamId' } },
      },
    }),
    secondFactor({ issuer: 'Tallybrook' }),
    nextCookies(),
  ],
})
