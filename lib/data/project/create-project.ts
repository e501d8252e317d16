import { z } from 'zod'
import { project } from '@/db/schema/team'
import type { Context } from '@/lib/auth/context'
import { newId } from '@/lib/book/ids'
import { fail, ok, type Result } from '@/lib/errors'
import { note } from '../door/audit'
import { inTeam } from '../door/enter'
import { lockTeam } from '../door/lock-team'
import { projectName, teamSlug } from '../door/words'

const input = z.strictObject({ team: teamSlug, name: projectName })

/** Makes a project in a team. */
export function createProject(ctx: Context, given: z.input<typeof input>): Promise<Result<{ id: string }>> {
  return inTeam(ctx, 'project.create', input, given, async (seat, { name }) => {
    await lockTeam(seat)
    const values = { id: newId(), teamId: seat.team.id, name, createdBy: seat.userId }
    const [made] = await seat.tx
      .insert(project)
      .values(values)
      .onConflictDoNothing({ target: [project.teamId, project.name] })
      .returning({ id: project.id })
    if (!made) return fail('conflict', `There is already a project called ${name} in this team.`)
    await note(seat, 'project.create', { kind: 'project', id: made.id }, { name })
    return ok(made)
  })
}
