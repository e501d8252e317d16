import { newId } from '@/lib/book/ids'
import { actionsOf, type DoorRow, everyone, openers, owners, teamPage } from './door-kinds'
import { letTimePass, newAddress } from './post-box'
import { inviteSomebody } from './verb-table-people'
import type { TestTeam } from './world'

const team = 'app/(team)/[team]'
const teamAction = actionsOf(() => import('@/app/(team)/[team]/actions'))
const memberAction = actionsOf(() => import('@/app/(team)/[team]/members/actions'))
const settingsAction = actionsOf(() => import('@/app/(team)/[team]/settings/actions'))
const accountAction = actionsOf(() => import('@/app/account/actions'))
const own = { ofTeam: false } as const
const invitationAction = actionsOf(() => import('@/app/(public)/invitation/actions'))

const invitation = async (at: TestTeam) => {
  const { id } = await inviteSomebody(at)
  await letTimePass(id, 2)
  return id
}
const token = async (at: TestTeam) => (await inviteSomebody(at)).token

/** The rows of doors about people. */
export const peopleDoors: Record<string, DoorRow> = {
  [`${team}/actions.ts#createTeam`]: {
    ...teamAction(everyone, (actions) => actions.createTeam({ name: newId() })),
    ofTeam: false,
  },
  [`${team}/actions.ts#leaveTeam`]: teamAction(everyone, (actions, at) => actions.leaveTeam(at.slug)),
  [`${team}/members/page.tsx`]: teamPage(openers, () => import('@/app/(team)/[team]/members/page')),
  [`${team}/members/actions.ts#inviteMember`]: memberAction(owners, (actions, at) =>
    actions.inviteMember(at.slug, { email: newAddress(), role: 'checker', projects: [] }),
  ),
  [`${team}/members/actions.ts#resendInvitation`]: memberAction(
    owners,
    (actions, at, id) => actions.resendInvitation(at.slug, { invitation: id }),
    invitation,
  ),
  [`${team}/members/actions.ts#revokeInvitation`]: memberAction(
    owners,
    (actions, at, id) => actions.revokeInvitation(at.slug, { invitation: id }),
    invitation,
  ),
  [`${team}/members/actions.ts#changeRole`]: memberAction(owners, (actions, at) =>
    actions.changeRole(at.slug, { user: at.people.checker.userId, role: 'engineer' }),
  ),
  [`${team}/members/actions.ts#setMemberProjects`]: memberAction(owners, (actions, at) =>
    actions.setMemberProjects(at.slug, { user: at.people.analyst.userId, projects: [at.otherProject] }),
  ),
  [`${team}/members/actions.ts#deactivateMember`]: memberAction(owners, (actions, at) =>
    actions.deactivateMember(at.slug, { user: at.people.checker.userId }),
  ),
  [`${team}/members/actions.ts#reactivateMember`]: memberAction(owners, (actions, at) =>
    actions.reactivateMember(at.slug, { user: at.gone.checker.userId }),
  ),
  [`${team}/members/actions.ts#removeMember`]: memberAction(owners, (actions, at) =>
    actions.removeMember(at.slug, { user: at.people.checker.userId }),
  ),
  [`${team}/settings/page.tsx`]: teamPage(everyone, () => import('@/app/(team)/[team]/settings/page')),
  [`${team}/settings/events/page.tsx`]: teamPage(owners, () => import('@/app/(team)/[team]/settings/events/page')),
  [`${team}/settings/mail/page.tsx`]: teamPage(owners, () => import('@/app/(team)/[team]/settings/mail/page')),
  [`${team}/settings/actions.ts#updateTeamSettings`]: settingsAction(owners, (actions, at) =>
    actions.updateTeamSettings(at.slug, { decimal: 'comma' }),
  ),
  'app/account/page.tsx': { ...teamPage(everyone, () => import('@/app/account/page')), ...own },
  'app/account/actions.ts#changeName': {
    ...accountAction(everyone, (actions) => actions.changeName({ name: 'Ada' })),
    ...own,
  },
  // None of them has a session of this id; whose can be ended is in account.test.ts.
  'app/account/actions.ts#endSession': {
    ...accountAction(everyone, (actions) => actions.endSession({ session: 'nobodys' })),
    ...own,
    answer: 'notFound',
  },
  'app/account/actions.ts#endOtherSessions': {
    ...accountAction(everyone, (actions) => actions.endOtherSessions()),
    ...own,
  },
  'app/(public)/invitation/actions.ts#acceptInvitation': {
    ...invitationAction(everyone, (actions, _, mailed) => actions.acceptInvitation({ token: mailed }), token),
    answer: 'notAllowed',
  },
  'app/(public)/invitation/actions.ts#signUpAndAccept': {
    ...invitationAction(
      everyone,
      (actions, _, mailed) => actions.signUpAndAccept({ token: mailed, name: 'Ada', password: 'a long enough one' }),
      token,
    ),
    answer: 'notAllowed',
    signedOut: 'ok',
  },
}
