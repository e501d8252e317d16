import { betterAuth } from 'better-auth'
import { drizzleAdapter } from 'better-auth/adapters/drizzle'
import { APIError } from 'better-auth/api'
import { nextCookies } from 'better-auth/next-js'
import { organization } from 'better-auth/plugins'
import { account, rateLimit, session, user, verification } from '@/db/schema/account'
import { invitation, member, team } from '@/db/schema/team'
import { env } from '@/lib/env'
import { logger } from '@/lib/http/logger'
import { makeFirstTeam } from './first-team'
import { organisationAccess, organisationRoles } from './organisation-access'
import { longestPassword, shortestPassword } from './password'
import { nameProblem } from './person-name'
import { authDatabase, authTransaction } from './shared-transaction'
import { trustedOrigins } from './trusted-origins'

const day = 24 * 60 * 60

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
    schema: { user, session, account, verification, rateLimit, team, member, invitation },
    transaction: true,
  }),
  emailAndPassword: {
    enabled: true,
    autoSignIn: true,
    minPasswordLength: shortestPassword,
    maxPasswordLength: longestPassword,
  },
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
    nextCookies(),
  ],
})
