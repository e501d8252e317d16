'use server'

import { perform } from '@/app/perform'
import type { Role } from '@/lib/auth/permissions'
import * as invite from '@/lib/data/invitation/invite-member'
import * as resend from '@/lib/data/invitation/resend-invitation'
import * as revoke from '@/lib/data/invitation/revoke-invitation'
import * as change from '@/lib/data/member/change-role'
import * as deactivate from '@/lib/data/member/deactivate-member'
import * as reactivate from '@/lib/data/member/reactivate-member'
import * as remove from '@/lib/data/member/remove-member'
import * as setProjects from '@/lib/data/member/set-member-projects'

/** The small forms of the page of people. */
const shownAt = { path: '/[team]/members', kind: 'page' } as const

export async function inviteMember(team: string, input: { email: string; role: Role; projects: string[] }) {
  return perform((ctx) => invite.inviteMember(ctx, { team, ...input }), shownAt)
}

export async function resendInvitation(team: string, input: { invitation: string }) {
  return perform((ctx) => resend.resendInvitation(ctx, { team, ...input }), shownAt)
}

export async function revokeInvitation(team: string, input: { invitation: string }) {
  return perform((ctx) => revoke.revokeInvitation(ctx, { team, ...input }), shownAt)
}

export async function changeRole(team: string, input: { user: string; role: Role; projects?: string[] }) {
  return perform((ctx) => change.changeRole(ctx, { team, ...input }), shownAt)
}

export async function setMemberProjects(team: string, input: { user: string; projects: string[] }) {
  return perform((ctx) => setProjects.setMemberProjects(ctx, { team, ...input }), shownAt)
}

export async function deactivateMember(team: string, input: { user: string }) {
  return perform((ctx) => deactivate.deactivateMember(ctx, { team, ...input }), shownAt)
}

export async function reactivateMember(team: string, input: { user: string }) {
  return perform((ctx) => reactivate.reactivateMember(ctx, { team, ...input }), shownAt)
}

export async function removeMember(team: string, input: { user: string }) {
  return perform((ctx) => remove.removeMember(ctx, { team, ...input }), shownAt)
}
