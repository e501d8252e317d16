import { eq } from 'drizzle-orm'
import { describe, expect, it } from 'vitest'
import { db } from '@/db/client'
import { teamSettings } from '@/db/schema/settings'
import { member, team, teamEvent } from '@/db/schema/team'
import { newId } from '@/lib/book/ids'
import { listTeamEvents } from '@/lib/data/audit/list-team-events'
import { archiveBook } from '@/lib/data/book/archive-book'
import { createBook } from '@/lib/data/book/create-book'
import { getBook } from '@/lib/data/book/get-book'
import { defaultSettings } from '@/lib/data/door/team-settings'
import { createProject } from '@/lib/data/project/create-project'
import { listProjects } from '@/lib/data/project/list-projects'
import { renameProject } from '@/lib/data/project/rename-project'
import { getTeamSettings } from '@/lib/data/settings/get-team-settings'
import { updateTeamSettings } from '@/lib/data/settings/update-team-settings'
import { createTeam } from '@/lib/data/team/create-team'
import { getTeam } from '@/lib/data/team/get-team'
import { listMyTeams } from '@/lib/data/team/list-my-teams'
import { codeOf, makeBook, makeTeam, type TestTeam, value } from './world'

type Changes = Parameters<typeof updateTeamSettings>[1]['changes']
const update = (at: TestTeam, changes: Changes) => updateTeamSettings(at.people.owner, { team: at.slug, changes })

describe('the settings of a team', () => {
  it('are the defaults until they are changed, the same as those of the table', async () => {
    const at = await makeTeam()
    const seen = value(await getTeamSettings(at.people.reader, { team: at.slug }))
    expect(seen).toEqual({ name: `Team ${at.id}`, ...defaultSettings })
    await db.insert(teamSettings).values({ teamId: at.id })
    expect(value(await getTeamSettings(at.people.reader, { team: at.slug }))).toEqual(seen)
  })

  it('are changed field by field, and what changed is noted', async () => {
    const at = await makeTeam()
    value(await update(at, { massFlowUnit: 't/d', fractionDigits: 4, name: '  Kestrel ' }))
    const seen = value(await update(at, { decimal: 'comma', weakLimit: 5, massFlowUnit: 't/d' }))
    expect(seen).toEqual({
      ...defaultSettings,
      name: 'Kestrel',
      massFlowUnit: 't/d',
      fractionDigits: 4,
      decimal: 'comma',
      weakLimit: 5,
    })
    expect(value(await getTeam(at.people.reader, { team: at.slug })).name).toBe('Kestrel')
    const events = await db.select().from(teamEvent).where(eq(teamEvent.teamId, at.id)).orderBy(teamEvent.at)
    expect(events.map(({ detail }) => detail)).toEqual([
      {
        name: { from: `Team ${at.id}`, to: 'Kestrel' },
        massFlowUnit: { from: 'kg/h', to: 't/d' },
        fractionDigits: { from: null, to: 4 },
      },
      { decimal: { from: 'own', to: 'comma' }, weakLimit: { from: 10, to: 5 } },
    ])
    value(await update(at, { decimal: 'comma' }))
    expect(await db.select().from(teamEvent).where(eq(teamEvent.teamId, at.id))).toHaveLength(2)
  })

  it('lose nothing where two owners change different ones at the same moment', async () => {
    const at = await makeTeam()
    const { slug: name } = at
    const changes: Changes[] = [{ decimal: 'comma' }, { weakLimit: 3 }, { closureLimit: 1 }, { flowDigits: 5 }]
    await Promise.all(changes.map(async (one) => value(await update(at, one))))
    const seen = value(await getTeamSettings(at.people.owner, { team: name }))
    expect(seen).toMatchObject(Object.assign({}, ...changes))
  })

  it.each<[string, Changes]>([
    ['a unit of the other basis', { massFlowUnit: 'kmol/h' }],
    ['a unit that is none', { moleFlowUnit: 'furlongs' }],
    ['no digits', { flowDigits: 0 }],
    ['half a digit', { flowDigits: 2.5 }],
    ['a limit below zero', { weakLimit: -1 }],
    ['a limit that is no number', { closureLimit: Number.NaN }],
    ['an unknown decimal sign', { decimal: 'both' as never }],
    ['an analysis that is complete nowhere', { analysisLow: 99, analysisHigh: 98 }],
    ['crossing the limit that stands', { analysisHigh: 97 }],
    ['a domain that is none', { mailDomains: ['kestrel'] }],
    ['a domain with more in it', { mailDomains: ['kestrel.example/x'] }],
    ['no name', { name: ' ' }],
    ['another field', { slug: 'x' } as never],
  ])('refuse %s', async (_, changes) => {
    const at = await makeTeam()
    expect(codeOf(await update(at, changes))).toBe('badInput')
    expect(await db.select().from(teamSettings).where(eq(teamSettings.teamId, at.id))).toEqual([])
  })

  it('give a new book its unit, where none is asked for', async () => {
    const at = await makeTeam()
    value(await update(at, { massFlowUnit: 't/d', moleFlowUnit: 'mol/s' }))
    const unitOf = async (basis: 'mass' | 'mole', flowUnit?: string) => {
      const from = { kind: 'blank', basis, ...(flowUnit && { flowUnit }) } as const
      const wanted = { team: at.slug, projectId: at.project, name: 'Press', from }
      const { id } = value(await createBook(at.people.engineer, wanted))
      const [record] = value(await getBook(at.people.engineer, { book: id })).records
      return record?.kind === 'book' ? record.flowUnit : null
    }
    expect([await unitOf('mass'), await unitOf('mole'), await unitOf('mass', 'lb/h')]).toEqual(['t/d', 'mol/s', 'lb/h'])
  })

  it('come with a book as far as it needs them', async () => {
    const at = await makeTeam()
    value(await update(at, { decimal: 'comma', carriedDigits: 3, mailDomains: ['x.example'] }))
    const { settings } = value(await getBook(at.people.checker, { book: await makeBook(at) }))
    expect(settings).toEqual({
      decimal: 'comma',
      flowDigits: null,
      fractionDigits: null,
      carriedDigits: 3,
      closureLimit: 0.1,
      analysisLow: 98,
      analysisHigh: 102,
      weakLimit: 10,
    })
  })
})

describe('the audit trail', () => {
  it('tells who did what to what, the newest first', async () => {
    const at = await makeTeam()
    const { owner, engineer } = at.people
    const book = await makeBook(at)
    value(await archiveBook(engineer, { team: at.slug, book }))
    value(await renameProject(owner, { team: at.slug, project: at.project, name: 'Lime mill' }))
    const { events, next } = value(await listTeamEvents(owner, { team: at.slug }))
    expect(next).toBeNull()
    expect(events).toMatchObject([
      {
        by: { id: owner.userId, name: 'The owner' },
        action: 'project.rename',
        subject: { kind: 'project', id: at.project, name: 'Lime mill' },
        detail: { from: 'Mill', to: 'Lime mill' },
      },
      { by: { name: 'The engineer' }, action: 'book.archive', subject: { kind: 'book', name: 'Press section' } },
      { action: 'book.create', subject: { id: book } },
    ])
  })

  it('is read a page at a time, each event once, also where many are of one moment', async () => {
    const at = await makeTeam()
    const { userId: by } = at.people.owner
    const one = { teamId: at.id, by, action: 'team.create', subjectKind: 'team', subjectId: at.id }
    const moments = Array.from({ length: 23 }, (_, n) => new Date(1_700_000_000_000 + Math.floor(n / 5)))
    await db.insert(teamEvent).values(moments.map((moment) => ({ ...one, id: newId(), at: moment })))
    const seen: string[] = []
    let after: string | undefined
    for (let page = 0; page < 10; page++) {
      const asked = { team: at.slug, limit: 4, ...(after && { after }) }
      const { events, next } = value(await listTeamEvents(at.people.owner, asked))
      seen.push(...events.map(({ id }) => id))
      if (next === null) break
      after = next
    }
    expect([seen.length, new Set(seen).size]).toEqual([23, 23])
  })

  it('of another team is not reached through one of its events', async () => {
    const [at, other] = [await makeTeam(), await makeTeam()]
    value(await createProject(at.people.owner, { team: at.slug, name: 'Kiln' }))
    value(await createProject(other.people.owner, { team: other.slug, name: 'Kiln' }))
    const [event] = value(await listTeamEvents(other.people.owner, { team: other.slug })).events
    const asked = { team: at.slug, after: event?.id ?? '' }
    expect(value(await listTeamEvents(at.people.owner, asked)).events).toEqual([])
  })
})

describe('another team', () => {
  it('is made by anybody, who owns it, with a first project', async () => {
    const { reader } = (await makeTeam()).people
    const name = `Kestrel ${newId()}`
    const { slug } = value(await createTeam(reader, { name: ` ${name} ` }))
    expect(value(await getTeam(reader, { team: slug }))).toMatchObject({ name, role: 'owner' })
    expect(value(await listProjects(reader, { team: slug })).map((project) => project.name)).toEqual(['First project'])
    expect(value(await listMyTeams(reader, {}))).toHaveLength(2)
    const again = value(await createTeam(reader, { name }))
    expect(again.slug).not.toBe(slug)
  })

  it.each(['', ' ', 'x'.repeat(121), 'a\u0000b'])('cannot be called "%s"', async (name) => {
    expect(codeOf(await createTeam((await makeTeam()).people.owner, { name }))).toBe('badInput')
  })

  it('is refused to who owns fifty', async () => {
    const { userId } = (await makeTeam()).people.reader
    const teams = Array.from({ length: 50 }, () => ({ id: newId(), name: 'x', slug: `t-${newId()}` }))
    await db.insert(team).values(teams)
    await db.insert(member).values(teams.map(({ id }) => ({ id: newId(), teamId: id, userId, role: 'owner' as const })))
    expect(codeOf(await createTeam({ userId, requestId: 'test' }, { name: 'Kestrel' }))).toBe('tooMany')
  })
})
