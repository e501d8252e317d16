import { type Action, actions, mayDo, type Role, seesEveryProject } from '@/lib/auth/permissions'

/** What the first role may and the second may not. */
export const lostActions = (from: Role, to: Role): Action[] =>
  actions.filter((action) => mayDo(from, action) && !mayDo(to, action))

/** Whether a change of role is asked about first: it takes something away, chooses projects, or hands over the team. */
export function isAskedFirst(from: Role, to: Role): boolean {
  return to === 'owner' || !seesEveryProject(to) || lostActions(from, to).length > 0
}
