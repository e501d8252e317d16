import { db } from '@/db/client'
import { session } from '@/db/schema/account'
import type { Context } from '@/lib/auth/context'
import type { Role } from '@/lib/auth/permissions'
import { newId } from '@/lib/book/ids'
import { changeName } from '@/lib/data/account/change-name'
import { endOtherSessions } from '@/lib/data/account/end-other-sessions'
import { endSession } from '@/lib/data/account/end-session'
import { getAccount } from '@/lib/data/account/get-account'
import { listMySessions } from '@/lib/data/account/list-my-sessions'
import { listTeamEvents } from '@/lib/data/audit/list-team-events'
import { acceptInvitation } from '@/lib/data/invitation/accept-invitation'
import { inviteMember } from '@/lib/data/invitation/invite-member'
import { listInvitations } from '@/lib/data/invitation/list-invitations'
import { lookInvitation } from '@/lib/data/invitation/look-invitation'
import { resendInvitation } from '@/lib/data/invitation/resend-invitation'
import { revokeInvitation } from '@/lib/data/invitation/revoke-invitation'
import { signUpAndAccept } from '@/lib/data/invitation/sign-up-and-accept'
import { changeRole } from '@/lib/data/member/change-role'
import { deactivateMember } from '@/lib/data/member/deactivate-member'
import { listMembers } from '@/lib/data/member/list-members'
import { reactivateMember } from '@/lib/data/member/reactivate-member'
import { removeMember } from '@/lib/data/member/remove-member'
import { setMemberProjects } from '@/lib/data/member/set-member-projects'
import { setProjectMembers } from '@/lib/data/project/set-project-members'
import { getTeamSettings } from '@/lib/data/settings/get-team-settings'
import { updateTeamSettings } from '@/lib/data/settings/update-team-settings'
import { createTeam } from '@/lib/data/team/create-team'
import { leaveTeam } from '@/lib/data/team/leave-team'
import { letTimePass, newAddress, tokenMailedTo } from './post-box'
import type { VerbRow } from './verb-table'
import { type TestTeam, value } from './world'

const everyone: readonly Role[] = ['owner', 'engineer', 'analyst', 'checker', 'reader']

const ownersWrite = { may: ['owner'], writes: 'team', ofTeam: true } as const
const ownersRead = { may: ['owner'], writes: 'nothing', ofTeam: true } as const
const own = { may: everyone, ofTeam: false } as const

export async function inviteSomebody(at: TestTeam): Promise<{ id: string; token: string }> {
  const email = newAddress()
  const { id } = value(await inviteMember(at.people.owner, { team: at.slug, email, role: 'checker' }))
  return { id, token: await tokenMailedTo(email) }
}

const sessionId = (ctx: Context) => `of-${ctx.userId}`
const provideSession = async (ctx: Context) => {
  if (ctx.userId === null) return
  const values = { token: newId(), userId: ctx.userId, expiresAt: new Date(Date.now() + 60_000) }
  await db.insert(session).values({ id: sessionId(ctx), ...values })
}

/** The rows of verbs about people: accounts, teams, members, invitations, settings, the audit trail. */
export const peopleVerbs: Record<string, VerbRow> = {
  'account/get-account': { ...own, writes: 'nothing', prepare: async () => (ctx) => getAccount(ctx, {}) },
  'account/change-name': { ...own, writes: 'own', prepare: async () => (ctx) => changeName(ctx, { name: 'Ada' }) },
  'account/list-my-sessions': { ...own, writes: 'nothing', prepare: async () => (ctx) => listMySessions(ctx, {}) },
  'account/end-session': {
    ...own,
    writes: 'own',
    provide: provideSession,
    prepare: async () => (ctx) => endSession(ctx, { session: sessionId(ctx) }),
  },
  'account/end-other-sessions': {
    ...own,
    writes: 'own',
    provide: provideSession,
    prepare: async () => (ctx) => endOtherSessions({ ...ctx, sessionId: 'another' }, {}),
  },
  'team/create-team': { ...own, writes: 'own', prepare: async () => (ctx) => createTeam(ctx, { name: newId() }) },
  'team/leave-team': {
    may: everyone,
    writes: 'team',
    ofTeam: true,
    prepare: async (at) => (ctx) => leaveTeam(ctx, { team: at.slug }),
  },
  'member/list-members': {
    may: ['owner', 'engineer', 'checker'],
    writes: 'nothing',
    ofTeam: true,
    prepare: async (at) => (ctx) => listMembers(ctx, { team: at.slug }),
  },
  'member/change-role': {
    ...ownersWrite,
    prepare: async (at) => (ctx) =>
      changeRole(ctx, { team: at.slug, user: at.people.checker.userId, role: 'reader', projects: [at.project] }),
  },
  'member/deactivate-member': {
    ...ownersWrite,
    prepare: async (at) => (ctx) => deactivateMember(ctx, { team: at.slug, user: at.people.checker.userId }),
  },
  'member/reactivate-member': {
    ...ownersWrite,
    prepare: async (at) => (ctx) => reactivateMember(ctx, { team: at.slug, user: at.gone.checker.userId }),
  },
  'member/remove-member': {
    ...ownersWrite,
    prepare: async (at) => (ctx) => removeMember(ctx, { team: at.slug, user: at.people.analyst.userId }),
  },
  'member/set-member-projects': {
    ...ownersWrite,
    prepare: async (at) => (ctx) =>
      setMemberProjects(ctx, { team: at.slug, user: at.people.analyst.userId, projects: [at.otherProject] }),
  },
  'project/set-project-members': {
    ...ownersWrite,
    prepare: async (at) => (ctx) =>
      setProjectMembers(ctx, { team: at.slug, project: at.otherProject, users: [at.people.reader.userId] }),
  },
  'invitation/invite-member': {
    ...ownersWrite,
    prepare: async (at) => (ctx) => inviteMember(ctx, { team: at.slug, email: newAddress(), role: 'engineer' }),
  },
  'invitation/list-invitations': {
    ...ownersRead,
    prepare: async (at) => (ctx) => listInvitations(ctx, { team: at.slug }),
  },
  'invitation/resend-invitation': {
    ...ownersWrite,
    prepare: async (at) => {
      const { id } = await inviteSomebody(at)
      await letTimePass(id, 2)
      return (ctx) => resendInvitation(ctx, { team: at.slug, invitation: id })
    },
  },
  'invitation/revoke-invitation': {
    ...ownersWrite,
    prepare: async (at) => {
      const { id } = await inviteSomebody(at)
      return (ctx) => revokeInvitation(ctx, { team: at.slug, invitation: id })
    },
  },
  'invitation/look-invitation': {
    ...own,
    writes: 'nothing',
    signedOut: 'ok',
    prepare: async (at) => {
      const { token } = await inviteSomebody(at)
      return (ctx) => lookInvitation(ctx, { token })
    },
  },
  // It is for another address than that of any of them; who it is for is in invitations.test.ts.
  'invitation/accept-invitation': {
    ...own,
    writes: 'team',
    answer: 'notAllowed',
    prepare: async (at) => {
      const { token } = await inviteSomebody(at)
      return (ctx) => acceptInvitation(ctx, { token })
    },
  },
  'invitation/sign-up-and-accept': {
    ...own,
    writes: 'team',
    answer: 'notAllowed',
    signedOut: 'ok',
    prepare: async (at) => {
      const { token } = await inviteSomebody(at)
      return (ctx) => signUpAndAccept(ctx, { token, name: 'Ada', password: 'a long enough one' })
    },
  },
  'settings/get-team-settings': {
    may: everyone,
    writes: 'nothing',
    ofTeam: true,
    prepare: async (at) => (ctx) => getTeamSettings(ctx, { team: at.slug }),
  },
  'settings/update-team-settings': {
    ...ownersWrite,
    prepare: async (at) => (ctx) => updateTeamSettings(ctx, { team: at.slug, changes: { decimal: 'comma' } }),
  },
  'audit/list-team-events': { ...ownersRead, prepare: async (at) => (ctx) => listTeamEvents(ctx, { team: at.slug }) },
}
