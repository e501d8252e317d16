import { readdirSync } from 'node:fs'
import { describe, expect, it } from 'vitest'
import { roles } from '@/lib/auth/permissions'
import { fingerprint, traces } from './fingerprint'
import { type VerbRow, verbTable } from './verb-table'
import { codeOf, makeTeam, nobody } from './world'

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

describe.each(Object.entries(verbTable))('%s', (_, row: VerbRow) => {
  it.each(roles)('by a member who is %s', async (role) => {
    const at = await makeTeam()
    const call = await row.prepare(at)
    await expectAnswer(
      row,
      at.id,
      () => call(at.people[role]),
      row.may.includes(role) ? 'ok' : 'notAllowed',
      at.people[role].userId,
    )
  })

  it.each(roles)('by a %s who belongs to another project', async (role) => {
    const at = await makeTeam()
    const call = await row.prepare(at)
    await expectAnswer(
      row,
      at.id,
      () => call(at.elsewhere[role]),
      row.may.includes(role) ? 'ok' : 'notAllowed',
      at.elsewhere[role].userId,
    )
  })

  it.each(roles)('by a %s of another team', async (role) => {
    const [at, other] = [await makeTeam(), await makeTeam()]
    const call = await row.prepare(at)
    await expectAnswer(
      row,
      at.id,
      () => call(other.people[role]),
      row.ofTeam ? 'notFound' : 'ok',
      other.people[role].userId,
    )
  })

  it.each(roles)('by a %s who has been let go', async (role) => {
    const at = await makeTeam()
    const call = await row.prepare(at)
    await expectAnswer(row, at.id, () => call(at.gone[role]), row.ofTeam ? 'notFound' : 'ok', at.gone[role].userId)
  })

  it('by nobody who is signed in', async () => {
    const at = await makeTeam()
    const call = await row.prepare(at)
    await expectAnswer(row, at.id, () => call(nobody), 'signedOut', '')
  })
})

/** The answer's code; and that a refusal wrote nothing, while a success of a writing verb left its trace. */
async function expectAnswer(
  row: VerbRow,
  teamId: string,
  call: () => ReturnType<Awaited<ReturnType<VerbRow['prepare']>>>,
  code: string,
  userId: string,
): Promise<void> {
  const before = await fingerprint(teamId)
  const tracesBefore = await traces(teamId, userId)
  expect(codeOf(await call())).toBe(code)
  if (row.writes && code === 'ok') expect(await traces(teamId, userId)).toBeGreaterThan(tracesBefore)
  else expect(await fingerprint(teamId)).toBe(before)
}
