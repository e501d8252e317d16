import { teamEvent } from '@/db/schema/team'
import type { Action } from '@/lib/auth/permissions'
import { newId } from '@/lib/book/ids'
import type { Seat } from './seat'

/** Notes what was done in a team, in the transaction that does it: neither stands without the other. */
export async function note(
  { tx, team, userId }: Seat,
  action: Action,
  subject: { kind: 'project' | 'book'; id: string },
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
