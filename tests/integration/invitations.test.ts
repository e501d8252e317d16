import { and, eq, sql } from 'drizzle-orm'
import { afterEach, describe, expect, it } from 'vitest'
import { db } from '@/db/client'
import { user } from '@/db/schema/account'
import { mailDelivery } from '@/db/schema/mail'
import { invitation, invitationProject, member } from '@/db/schema/team'
import type { Context } from '@/lib/auth/context'
import { newId } from '@/lib/book/ids'
import { acceptInvitation } from '@/lib/data/invitation/accept-invitation'
import { inviteMember } from '@/lib/data/invitation/invite-member'
import { listInvitations } from '@/lib/data/invitation/list-invitations'
import { lookInvitation } from '@/lib/data/invitation/look-invitation'
import { resendInvitation } from '@/lib/data/invitation/resend-invitation'
import { revokeInvitation } from '@/lib/data/invitation/revoke-invitation'
import { signUpAndAccept } from '@/lib/data/invitation/sign-up-and-accept'
import { deactivateMember } from '@/lib/data/member/deactivate-member'
import { listMembers } from '@/lib/data/member/list-members'
import { listProjects } from '@/lib/data/project/list-projects'
import { updateTeamSettings } from '@/lib/data/settings/update-team-settings'
import { listMyTeams } from '@/lib/data/team/list-my-teams'
import { letTimePass, mailsTo, newAddress, tokenMailedTo } from './post-box'
import { password, signedUp, Visitor } from './visitor'
import { codeOf, makeTeam, nobody, type TestTeam, value } from './world'

type Invited = Parameters<typeof inviteMember>[1]
const invite = (at: TestTeam, more: Partial<Invited> & { email: string }) =>
  inviteMember(at.people.owner, { team: at.slug, role: 'engineer', ...more })

async function invited(at: TestTeam, more: Partial<Invited> = {}) {
  const typed = more.email ?? newAddress()
  const { id } = value(await invite(at, { ...more, email: typed }))
  const email = typed.trim().toLowerCase()
  return { id, email, token: await tokenMailedTo(email) }
}

const message = (result: { ok: boolean; error?: { message: string } }) => result.error?.message ?? 'ok'
const newcomer = (token: string) => signUpAndAccept(nobody, { token, name: 'Priya', password })
const day = 24 * 60

describe('an invitation', () => {
  it('goes out by mail, with a link whose token is kept nowhere else', async () => {
    const at = await makeTeam()
    const { id, email, token } = await invited(at, { role: 'analyst', projects: [at.project] })
    const [mail, ...more] = await mailsTo(email)
    expect(more).toEqual([])
    expect(mail).toMatchObject({ kind: 'invitation', inviter: 'The owner', role: 'analyst', projects: ['Mill'] })
    expect(token).toMatch(/^[\w-]{43}$/)
    const [delivery] = await db.select().from(mailDelivery).where(eq(mailDelivery.to, email))
    expect(delivery).toMatchObject({ teamId: at.id, state: 'queued' })
    const { rows } = await db.execute(sql`
      select to_jsonb(i) as kept, (select jsonb_agg(e) from team_event e where e.subject_id = i.id) as events
      from invitation i where id = ${id}`)
    expect(JSON.stringify([rows, delivery])).not.toContain(token)
    expect(value(await listInvitations(at.people.owner, { team: at.slug }))).toMatchObject([
      { id, email, role: 'analyst', projects: [{ id: at.project, name: 'Mill' }], hasExpired: false },
    ])
  })

  it('shows what it is for to who is signed out', async () => {
    const at = await makeTeam()
    const { email, token } = await invited(at, { role: 'reader', projects: [at.project, at.otherProject] })
    const look = value(await lookInvitation(nobody, { token }))
    expect(look).toEqual({
      team: `Team ${at.id}`,
      inviter: 'The owner',
      role: 'reader',
      projects: ['Mill', 'Quarry'],
      email,
      expiresAt: expect.any(Date),
      hasAccount: false,
      you: { kind: 'nobody' },
    })
    expect((look.expiresAt.getTime() - Date.now()) / 86_400_000).toBeCloseTo(7, 2)
  })

  it('makes a new person a member, with a confirmed address and no team of their own', async () => {
    const at = await makeTeam()
    const typed = ` ${newAddress().toUpperCase()} `
    const { email, token } = await invited(at, { email: typed, role: 'analyst', projects: [at.project] })
    expect(value(await newcomer(token))).toEqual({ team: at.slug, email })
    const visitor = new Visitor()
    expect((await visitor.signIn(email)).status).toBe(200)
    const ctx = await visitor.context()
    expect(value(await listMyTeams(ctx, {}))).toMatchObject([{ slug: at.slug, role: 'analyst' }])
    expect(value(await listProjects(ctx, { team: at.slug })).map(({ name }) => name)).toEqual(['Mill'])
    expect(value(await listInvitations(at.people.owner, { team: at.slug }))).toEqual([])
    expect(message(await newcomer(token))).toMatch(/accepted already/)
  })

  it('makes somebody a member who has an account, in both teams then', async () => {
    const at = await makeTeam()
    const { email, at: visitor } = await signedUp('Grace')
    const { token } = await invited(at, { email: email.toUpperCase(), role: 'checker' })
    const ctx = await visitor.context()
    expect(value(await lookInvitation(ctx, { token }))).toMatchObject({
      hasAccount: true,
      you: { kind: 'invited' },
    })
    expect(message(await newcomer(token))).toMatch(/has an account already/)
    expect(value(await acceptInvitation(ctx, { token }))).toEqual({ team: at.slug })
    expect(value(await listMyTeams(ctx, {}))).toHaveLength(2)
  })

  it('is not for who is signed in with another address, which is said plainly', async () => {
    const at = await makeTeam()
    const { email, token } = await invited(at)
    const { email: mine, at: visitor } = await signedUp()
    const ctx = await visitor.context()
    expect(value(await lookInvitation(ctx, { token })).you).toEqual({ kind: 'somebodyElse', email: mine })
    const refused = await acceptInvitation(ctx, { token })
    expect(codeOf(refused)).toBe('notAllowed')
    expect(message(refused)).toBe(
      `This invitation is for ${email}, and you are signed in as ${mine}. Sign out, and open the link again.`,
    )
  })

  it('takes over an account that somebody made with the address and never confirmed', async () => {
    const at = await makeTeam()
    const email = newAddress()
    await new Visitor().signUp(email, 'Mallory', 'the password of another')
    const { token } = await invited(at, { email })
    expect(value(await lookInvitation(nobody, { token })).hasAccount).toBe(false)
    value(await newcomer(token))
    expect((await new Visitor().signIn(email, 'the password of another')).status).toBe(401)
    expect((await new Visitor().signIn(email)).status).toBe(200)
    const people = await db.select({ name: user.name }).from(user).where(eq(user.email, email))
    expect(people).toEqual([{ name: 'Priya' }])
  })

  it('is used once, also by two at the same moment', async () => {
    const at = await makeTeam()
    const { email, token } = await invited(at)
    const both = await Promise.all([newcomer(token), newcomer(token)])
    expect(both.map(codeOf).sort()).toEqual(['conflict', 'ok'])
    const [person] = await db.select({ id: user.id }).from(user).where(eq(user.email, email))
    const mine = and(eq(member.teamId, at.id), eq(member.userId, person?.id ?? ''))
    expect(await db.select().from(member).where(mine)).toHaveLength(1)
  })
})

describe('a link that is of no use', () => {
  const answers = async (token: string) => {
    const { at } = await signedUp()
    const asked: [(ctx: Context, input: { token: string }) => Promise<Parameters<typeof codeOf>[0]>, Context][] = [
      [lookInvitation, nobody],
      [acceptInvitation, await at.context()],
    ]
    const said = await Promise.all(asked.map(async ([verb, ctx]) => verb(ctx, { token })))
    return [...said, await newcomer(token)].map((result) => [codeOf(result), message(result as never)])
  }

  it('is answered alike whatever was guessed', async () => {
    const at = await makeTeam()
    const { token } = await invited(at)
    const guesses = ['', 'x', `${token}x`, token.slice(0, -1), token.toLowerCase(), 'x'.repeat(100_000), '\u0000', '%']
    const said = await Promise.all(guesses.map(answers))
    expect(new Set(said.flat().map(String)).size).toBe(1)
    expect(said[0]?.[0]).toEqual(['notFound', expect.stringMatching(/link is not right/)])
  })

  it('says so once it has run out, and tells nothing of the team', async () => {
    const at = await makeTeam()
    const { id, token } = await invited(at)
    await letTimePass(id, 7 * day - 1)
    expect(codeOf(await lookInvitation(nobody, { token }))).toBe('ok')
    await letTimePass(id, 2)
    for (const [code, said] of await answers(token)) {
      expect(code).toBe('conflict')
      expect(said).toMatch(/has run out/)
      expect(said).not.toContain(at.id)
    }
  })

  it('says so once it was withdrawn', async () => {
    const at = await makeTeam()
    const { id, token } = await invited(at)
    value(await revokeInvitation(at.people.owner, { team: at.slug, invitation: id }))
    for (const [code, said] of await answers(token))
      expect([code, said]).toEqual(['notFound', expect.stringMatching(/withdrawn/)])
    expect(codeOf(await revokeInvitation(at.people.owner, { team: at.slug, invitation: id }))).toBe('notFound')
    expect(codeOf(await invite(at, { email: newAddress() }))).toBe('ok')
  })

  it('is the former one after it was sent again; the new one is good for seven more days', async () => {
    const at = await makeTeam()
    const { id, email, token } = await invited(at)
    const again = () => resendInvitation(at.people.owner, { team: at.slug, invitation: id })
    expect(codeOf(await again())).toBe('tooMany')
    await letTimePass(id, 8 * day)
    value(await again())
    const fresh = await tokenMailedTo(email)
    expect(fresh).not.toBe(token)
    expect(message(await lookInvitation(nobody, { token }))).toMatch(/newer one was sent/)
    value(await newcomer(fresh))
  })
})

describe('inviting', () => {
  afterEach(() => db.execute(sql`drop trigger if exists no_events on team_event`))

  it('keeps nothing and mails nothing where it cannot be kept', async () => {
    const at = await makeTeam()
    const email = newAddress()
    await db.execute(
      sql`create or replace function refuse() returns trigger as $$ begin raise 'refused'; end $$ language plpgsql`,
    )
    await db.execute(sql`create trigger no_events before insert on team_event for each row execute function refuse()`)
    await expect(invite(at, { email })).rejects.toThrow()
    expect(await mailsTo(email)).toEqual([])
    expect(await db.select().from(invitation).where(eq(invitation.email, email))).toEqual([])
  })

  it('an address twice is refused while the first stands, also at the same moment', async () => {
    const at = await makeTeam()
    const email = newAddress()
    const results = await Promise.all(Array.from({ length: 4 }, () => invite(at, { email })))
    expect(results.map(codeOf).sort()).toEqual(['conflict', 'conflict', 'conflict', 'ok'])
    expect(await mailsTo(email)).toHaveLength(1)
    const [first] = value(await listInvitations(at.people.owner, { team: at.slug }))
    await letTimePass(first?.id ?? '', 8 * day)
    value(await invite(at, { email }))
    expect(value(await listInvitations(at.people.owner, { team: at.slug }))).toMatchObject([
      { email, hasExpired: false },
    ])
  })

  it('a member is refused, and one who was let go is to be reactivated', async () => {
    const at = await makeTeam()
    const emailOf = (userId: string) => `${userId}@x.example`
    expect(message(await invite(at, { email: emailOf(at.people.reader.userId) }))).toMatch(/in this team already/)
    const gone = emailOf(at.gone.reader.userId)
    expect(message(await invite(at, { email: gone }))).toMatch(/reactivate them instead/)
  })

  it('who became a member meanwhile keeps the role; who was let go meanwhile stays out', async () => {
    const at = await makeTeam()
    for (const letGo of [false, true]) {
      const { email, at: visitor } = await signedUp()
      const { token } = await invited(at, { email })
      const ctx = await visitor.context()
      await db.insert(member).values({ id: newId(), teamId: at.id, userId: ctx.userId ?? '', role: 'checker' })
      if (letGo) value(await deactivateMember(at.people.owner, { team: at.slug, user: ctx.userId ?? '' }))
      expect(codeOf(await acceptInvitation(ctx, { token }))).toBe(letGo ? 'notAllowed' : 'ok')
      const members = value(await listMembers(at.people.owner, { team: at.slug }))
      expect(members.find(({ userId }) => userId === ctx.userId)?.role).toBe('checker')
    }
  })

  it('analysts and readers needs a project, of this team', async () => {
    const [at, other] = [await makeTeam(), await makeTeam()]
    const email = newAddress()
    for (const role of ['analyst', 'reader'] as const) {
      expect(codeOf(await invite(at, { email, role }))).toBe('badInput')
      expect(codeOf(await invite(at, { email, role, projects: [at.project, other.project] }))).toBe('notFound')
      expect(codeOf(await invite(at, { email, role, projects: [newId()] }))).toBe('notFound')
    }
    expect(await mailsTo(email)).toEqual([])
    const { id } = await invited(at, { role: 'engineer', projects: [at.project] })
    expect(await db.select().from(invitationProject).where(eq(invitationProject.invitationId, id))).toEqual([])
  })

  it.each([
    '',
    'ada',
    'ada@',
    '@x.example',
    'a b@x.example',
    'ada@x.example\nbcc: eve@x.example',
    `${'x'.repeat(250)}@x.example`,
  ])('needs an address, not "%s"', async (email) =>
    expect(codeOf(await invite(await makeTeam(), { email }))).toBe('badInput'),
  )

  it('keeps to the mail domains of the team, when inviting and when accepting', async () => {
    const at = await makeTeam()
    const early = await invited(at)
    const allow = (mailDomains: string[]) =>
      updateTeamSettings(at.people.owner, { team: at.slug, changes: { mailDomains } })
    expect(value(await allow(['@Kestrel.example', 'kestrel.example'])).mailDomains).toEqual(['kestrel.example'])
    for (const email of [
      'eve@x.example',
      'eve@evil-kestrel.example',
      'eve@lab.kestrel.example',
      'eve@kestrel.example.org',
    ])
      expect(message(await invite(at, { email }))).toMatch(/takes only @kestrel.example/)
    expect(codeOf(await newcomer(early.token))).toBe('notAllowed')
    expect(await db.select().from(user).where(eq(user.email, early.email))).toEqual([])
    value(await invite(at, { email: `${newId()}@KESTREL.example` }))
    value(await allow([]))
    value(await newcomer(early.token))
  })

  it('of another team can be neither sent again nor withdrawn', async () => {
    const [at, other] = [await makeTeam(), await makeTeam()]
    const { id } = await invited(other)
    await letTimePass(id, 5)
    const wanted = { team: at.slug, invitation: id }
    expect(codeOf(await resendInvitation(at.people.owner, wanted))).toBe('notFound')
    expect(codeOf(await revokeInvitation(at.people.owner, wanted))).toBe('notFound')
  })
})
