import { readdirSync } from 'node:fs'
import { describe, expect, it } from 'vitest'
import type { Context } from '@/lib/auth/context'
import { roles } from '@/lib/auth/permissions'
import { fingerprint, fingerprintOfPerson, traces } from './fingerprint'
import { type VerbRow, verbTable } from './verb-table'
import { codeOf, makeTeam, nobody, type TestTeam } from './world'

const folder = new URL('../../lib/data', import.meta.url).pathname
/** Folders of lib/data that hold what verbs are made of. */
const notVerbs = ['door', 'records']

const verbFiles = readdirSync(folder, { withFileTypes: true })
  .filter((entry) => entry.isDirectory() && !notVerbs.includes(entry.name))
  .flatMap((entry) => readdirSync(`${folder}/${entry.name}`).map((file) => `${entry.name}/${file}`))
  .filter((file) => !file.endsWith('.test.ts'))
  .map((file) => file.replace(/\.ts$/, ''))

const camel = (file: string) => (file.split('/')[1] ?? '').replace(/-(.)/g, (_, letter: string) => letter.toUpperCase())

describe('verbs', () => {
  it('have a row each in the table', () => {
    expect(Object.keys(verbTable).sort()).toEqual(verbFiles.sort())
  })

  it.each(verbFiles)('%s exports one function, named like its file', async (file) => {
    const module = (await import(/* @vite-ignore */ `${folder}/${file}.ts`)) as Record<string, unknown>
    expect(Object.keys(module)).toEqual([camel(file)])
  })
})

type Caller = Context & { userId: string }

describe.each(Object.entries(verbTable))('%s', (_, row: VerbRow) => {
  it.each(roles)('by a member who is %s', async (role) => {
    const at = await makeTeam()
    await expectAnswer(row, at, at.people[role], row.may.includes(role) ? 'ok' : 'notAllowed')
  })

  it.each(roles)('by a %s who belongs to another project', async (role) => {
    const at = await makeTeam()
    await expectAnswer(row, at, at.elsewhere[role], row.may.includes(role) ? 'ok' : 'notAllowed')
  })

  it.each(roles)('by a %s of another team', async (role) => {
    const [at, other] = [await makeTeam(), await makeTeam()]
    await expectAnswer(row, at, other.people[role], row.ofTeam ? 'notFound' : 'ok')
  })

  it.each(roles)('by a %s who has been let go', async (role) => {
    const at = await makeTeam()
    await expectAnswer(row, at, at.gone[role], row.ofTeam ? 'notFound' : 'ok')
  })

  it('by nobody who is signed in', async () => {
    const at = await makeTeam()
    await expectAnswer({ ...row, answer: row.signedOut ?? 'signedOut' }, at, { ...nobody, userId: '' }, 'signedOut')
  })
})

/** The answer's code; and that a refusal wrote nothing, while a success of a writing verb left its trace. */
async function expectAnswer(row: VerbRow, at: TestTeam, caller: Caller, byRole: string): Promise<void> {
  const { userId } = caller
  const ctx: Context = userId === '' ? nobody : caller
  const call = await row.prepare(at)
  await row.provide?.(ctx)
  const look = async () => ({
    team: await fingerprint(at.id),
    traces: await traces(at.id, userId),
    person: await fingerprintOfPerson(userId),
  })
  const before = await look()
  const code = codeOf(await call(ctx))
  const after = await look()
  expect(code).toBe(row.answer ?? byRole)
  const wrote = code === 'ok' ? row.writes : 'nothing'
  if (wrote === 'team') expect(after.traces).toBeGreaterThan(before.traces)
  else expect(after.team).toBe(before.team)
  if (wrote === 'own') expect(after.person).not.toBe(before.person)
  else if (wrote === 'nothing') expect(after.person).toBe(before.person)
}
