import type { Transaction } from '@/db/client'
import { teamEvent } from '@/db/schema/team'
import type { Action } from '@/lib/auth/permissions'
import { newId } from '@/lib/book/ids'
import type { Seat } from './seat'

/** What can be done in a team: what the permission table knows, and what is done by somebody who is not in it yet. */
export type Doing = Action | 'team.create' | 'invitation.accept'
export type Subject = { kind: 'team' | 'member' | 'invitation' | 'project' | 'book'; id: string }
type Doer = { tx: Transaction; userId: string; team: { id: string } }

/** Notes what was done in a team, in the transaction that does it: neither stands without the other. */
export async function note(
  { tx, team, userId }: Seat | Doer,
  action: Doing,
  subject: Subject,
  detail: Record<string, unknown> = {},
): Promise<void> {
  await tx.insert(teamEvent).values({
    id: newId(),
    teamId: team.id,
    by: userId,
    action,
    subjectKind: subject.kind,
    subjectId: subject.id,
    detail,
  })
}
