import { sql } from 'drizzle-orm'
import { db } from '@/db/client'

/** Everything that belongs to a team, as one text: equal before and after where nothing was written. */
export async function fingerprint(teamId: string): Promise<string> {
  const { rows } = await db.execute(sql`
    select (select jsonb_agg(t order by t.id) from team t where t.id = ${teamId}) as team,
      (select jsonb_agg(p order by p.id) from project p where p.team_id = ${teamId}) as projects,
      (select jsonb_agg(b order by b.id) from book b where b.team_id = ${teamId}) as books,
      (select count(*) from book_change c join book b on b.id = c.book_id where b.team_id = ${teamId}) as changes,
      (select count(*) from component r join book b on b.id = r.book_id where b.team_id = ${teamId}) as components,
      (select count(*) from team_event e where e.team_id = ${teamId}) as events`)
  return JSON.stringify(rows)
}

/** How many notes of a person's doings a team has: audit rows and book changes. */
export async function traces(teamId: string, userId: string): Promise<number> {
  const { rows } = await db.execute<{ traces: number }>(sql`
    select (select count(*) from team_event where team_id = ${teamId} and by = ${userId})::int
      + (select count(*) from book_change c join book b on b.id = c.book_id
         where b.team_id = ${teamId} and c.by = ${userId})::int as traces`)
  return rows[0]?.traces ?? 0
}
