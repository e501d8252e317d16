import { and, eq } from 'drizzle-orm'
import { z } from 'zod'
import { project } from '@/db/schema/team'
import type { Context } from '@/lib/auth/context'
import { fail, ok, type Result } from '@/lib/errors'
import { note } from '../door/audit'
import { inTeam } from '../door/enter'
import { lockTeam } from '../door/lock-team'
import { noSuchProject } from '../door/refusals'
import { visibleProjects } from '../door/visible-projects'
import { projectName, recordId, teamSlug } from '../door/words'

const input = z.strictObject({ team: teamSlug, project: recordId, name: projectName })

/** Gives a project another name. */
export function renameProject(ctx: Context, given: z.input<typeof input>): Promise<Result<{ id: string }>> {
  return inTeam(ctx, 'project.rename', input, given, async (seat, { project: id, name }) => {
    const { tx, team } = seat
    await lockTeam(seat)
    const ofTeam = await tx.select({ id: project.id, name: project.name }).from(project).where(visibleProjects(seat))
    const before = ofTeam.find((row) => row.id === id)
    if (!before) return noSuchProject()
    if (ofTeam.some((row) => row.name === name && row.id !== id))
      return fail('conflict', `There is already a project called ${name} in this team.`)
    await tx
      .update(project)
      .set({ name })
      .where(and(eq(project.teamId, team.id), eq(project.id, id)))
    await note(seat, 'project.rename', { kind: 'project', id }, { from: before.name, to: name })
    return ok({ id })
  })
}
