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
      (select jsonb_agg(m order by m.id) from member m where m.team_id = ${teamId}) as members,
      (select jsonb_agg(p order by p.project_id, p.user_id) from project_member p where p.team_id = ${teamId}) as belonging,
      (select jsonb_agg(i order by i.id) from invitation i where i.team_id = ${teamId}) as invitations,
      (select jsonb_agg(s) from team_settings s where s.team_id = ${teamId}) as settings,
      (select count(*) from mail_delivery d where d.team_id = ${teamId}) as mails,
      (select count(*) from team_event e where e.team_id = ${teamId}) as events`)
  return JSON.stringify(rows)
}

/** How many notes of a person's doings a team has: audit rows and book changes. Of nobody's: of anybody's. */
export async function traces(teamId: string, userId: string): Promise<number> {
  const { rows } = await db.execute<{ traces: number }>(sql`
    select (select count(*) from team_event where team_id = ${teamId} and (by = ${userId} or ${userId} = ''))::int
      + (select count(*) from book_change c join book b on b.id = c.book_id
         where b.team_id = ${teamId} and (c.by = ${userId} or ${userId} = ''))::int as traces`)
  return rows[0]?.traces ?? 0
}

/** Everything that is a person's own, in no team in particular. */
export async function fingerprintOfPerson(userId: string): Promise<string> {
  const { rows } = await db.execute(sql`
    select (select to_jsonb(u) from "user" u where u.id = ${userId}) as person,
      (select jsonb_agg(s order by s.id) from session s where s.user_id = ${userId}) as sessions,
      (select count(*) from member m where m.user_id = ${userId}) as memberships`)
  return JSON.stringify(rows)
}
