import { sql } from 'drizzle-orm'
import {
  check,
  foreignKey,
  index,
  jsonb,
  pgTable,
  primaryKey,
  text,
  timestamp,
  unique,
  uniqueIndex,
} from 'drizzle-orm/pg-core'
import { user } from './account'

const moment = (name: string) => timestamp(name, { withTimezone: true })
const role = () => text('role', { enum: ['owner', 'engineer', 'analyst', 'checker', 'reader'] })

/** Teams and who is in them. team, member and invitation are better-auth's organisation tables under our names. */
export const team = pgTable(
  'team',
  {
    id: text('id').primaryKey(),
    name: text('name').notNull(),
    /** The first part of every address of the team. */
    slug: text('slug').notNull().unique(),
    logo: text('logo'),
    metadata: text('metadata'),
    createdAt: moment('created_at').notNull().defaultNow(),
  },
  (t) => [check('team_slug_shape', sql`${t.slug} ~ '^[a-z0-9]+(-[a-z0-9]+)*$' and length(${t.slug}) <= 48`)],
)

export const member = pgTable(
  'member',
  {
    id: text('id').primaryKey(),
    teamId: text('team_id')
      .notNull()
      .references(() => team.id),
    userId: text('user_id')
      .notNull()
      .references(() => user.id),
    role: role().notNull(),
    /** Someone who has left: no longer let in, but the name stays on what they did. */
    deactivatedAt: moment('deactivated_at'),
    createdAt: moment('created_at').notNull().defaultNow(),
  },
  (t) => [
    unique('member_team_id_user_id_key').on(t.teamId, t.userId),
    index('member_user_id_idx').on(t.userId),
    check('member_role_known', sql`${t.role} in ('owner', 'engineer', 'analyst', 'checker', 'reader')`),
  ],
)

export const invitation = pgTable(
  'invitation',
  {
    id: text('id').primaryKey(),
    teamId: text('team_id')
      .notNull()
      .references(() => team.id),
    email: text('email').notNull(),
    role: role().notNull(),
    status: text('status', { enum: ['pending', 'accepted', 'rejected', 'canceled'] })
      .notNull()
      .default('pending'),
    inviterId: text('inviter_id')
      .notNull()
      .references(() => user.id),
    /** Of the token in the newest mail. The token itself is nowhere but in that mail. */
    tokenHash: text('token_hash').unique(),
    sentAt: moment('sent_at').notNull().defaultNow(),
    expiresAt: moment('expires_at').notNull(),
    acceptedBy: text('accepted_by').references(() => user.id),
    createdAt: moment('created_at').notNull().defaultNow(),
  },
  (t) => [
    // So that its projects can only be of its own team.
    unique('invitation_team_id_id_key').on(t.teamId, t.id),
    uniqueIndex('invitation_pending_key').on(t.teamId, t.email).where(sql`${t.status} = 'pending'`),
    index('invitation_team_id_idx').on(t.teamId),
    index('invitation_email_idx').on(t.email),
    check('invitation_role_known', sql`${t.role} in ('owner', 'engineer', 'analyst', 'checker', 'reader')`),
    check('invitation_status_known', sql`${t.status} in ('pending', 'accepted', 'rejected', 'canceled')`),
    check('invitation_pending_has_token', sql`${t.status} <> 'pending' or ${t.tokenHash} is not null`),
    check('invitation_accepted_by', sql`(${t.status} = 'accepted') = (${t.acceptedBy} is not null)`),
  ],
)

/** A folder of books: a client, a plant. */
export const project = pgTable(
  'project',
  {
    id: text('id').primaryKey(),
    teamId: text('team_id')
      .notNull()
      .references(() => team.id),
    name: text('name').notNull(),
    createdBy: text('created_by')
      .notNull()
      .references(() => user.id),
    createdAt: moment('created_at').notNull().defaultNow(),
  },
  (t) => [
    // So that a book or a membership can point at a project of its own team only.
    unique('project_team_id_id_key').on(t.teamId, t.id),
    unique('project_team_id_name_key').on(t.teamId, t.name),
    check('project_named', sql`length(btrim(${t.name})) > 0`),
  ],
)

/** Which projects an analyst or a reader sees. The other roles see all of their team's. */
export const projectMember = pgTable(
  'project_member',
  {
    teamId: text('team_id').notNull(),
    projectId: text('project_id').notNull(),
    userId: text('user_id').notNull(),
    createdAt: moment('created_at').notNull().defaultNow(),
  },
  (t) => [
    primaryKey({ name: 'project_member_pkey', columns: [t.projectId, t.userId] }),
    foreignKey({
      name: 'project_member_project_fk',
      columns: [t.teamId, t.projectId],
      foreignColumns: [project.teamId, project.id],
    }),
    foreignKey({
      name: 'project_member_member_fk',
      columns: [t.teamId, t.userId],
      foreignColumns: [member.teamId, member.userId],
    }),
    index('project_member_team_id_user_id_idx').on(t.teamId, t.userId),
  ],
)

/** The projects that an invited analyst or reader will belong to. */
export const invitationProject = pgTable(
  'invitation_project',
  {
    teamId: text('team_id').notNull(),
    invitationId: text('invitation_id').notNull(),
    projectId: text('project_id').notNull(),
  },
  (t) => [
    primaryKey({ name: 'invitation_project_pkey', columns: [t.invitationId, t.projectId] }),
    foreignKey({
      name: 'invitation_project_invitation_fk',
      columns: [t.teamId, t.invitationId],
      foreignColumns: [invitation.teamId, invitation.id],
    }),
    foreignKey({
      name: 'invitation_project_project_fk',
      columns: [t.teamId, t.projectId],
      foreignColumns: [project.teamId, project.id],
    }),
  ],
)

/** What was done in a team, by whom and when. Edits of books are not repeated here: book_change is their record. */
export const teamEvent = pgTable(
  'team_event',
  {
    id: text('id').primaryKey(),
    teamId: text('team_id')
      .notNull()
      .references(() => team.id),
    by: text('by')
      .notNull()
      .references(() => user.id),
    action: text('action').notNull(),
    subjectKind: text('subject_kind').notNull(),
    subjectId: text('subject_id').notNull(),
    detail: jsonb('detail').$type<Record<string, unknown>>().notNull().default({}),
    at: moment('at').notNull().defaultNow(),
  },
  (t) => [index('team_event_team_id_at_idx').on(t.teamId, t.at)],
)
