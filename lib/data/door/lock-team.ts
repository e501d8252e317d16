import { eq } from 'drizzle-orm'
import type { Transaction } from '@/db/client'
import { team } from '@/db/schema/team'

/** Those who change people, invitations or names of projects of one team wait for each other. */
export async function lockTeam({ tx, team: { id } }: { tx: Transaction; team: { id: string } }): Promise<void> {
  await tx.select({ id: team.id }).from(team).where(eq(team.id, id)).for('no key update')
}
