import { eq } from 'drizzle-orm'
import { team } from '@/db/schema/team'
import type { Seat } from './seat'

/** Those who name projects of one team wait for each other: no name is taken between the look and the write. */
export async function lockTeam({ tx, team: { id } }: Seat): Promise<void> {
  await tx.select({ id: team.id }).from(team).where(eq(team.id, id)).for('no key update')
}
