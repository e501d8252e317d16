import { readdirSync, readFileSync } from 'node:fs'
import path from 'node:path'
import { afterEach, describe, expect, it, vi } from 'vitest'
import { auth } from '@/lib/auth/auth'
import { openDoors } from '@/lib/auth/doors'
import { type Role, roles } from '@/lib/auth/permissions'
import { newId } from '@/lib/book/ids'
import { authDoors } from './auth-doors'
import { answerOf, type DoorRow } from './door-kinds'
import { doorTable, openToAnybody } from './door-table'
import { fingerprint } from './fingerprint'
import { Visitor } from './visitor'
import { makeTeam, type TestTeam } from './world'

vi.mock('next/headers', () => ({
  headers: async () => new Headers(),
  cookies: async () => ({ get: () => undefined, getAll: () => [], set: () => {} }),
}))
vi.mock('next/cache', () => ({ revalidatePath: () => {}, revalidateTag: () => {} }))

const root = path.resolve(import.meta.dirname, '../..')
const sources = (folder: string): string[] =>
  readdirSync(path.join(root, folder), { withFileTypes: true, recursive: true })
    .filter((entry) => entry.isFile() && /\.tsx?$/.test(entry.name) && !/\.test\.tsx?$/.test(entry.name))
    .map((entry) => path.relative(root, path.join(entry.parentPath, entry.name)))

const inApp = sources('app')
const routes = inApp.filter((file) => /\/route\.tsx?$/.test(file))
/** Pages that show what belongs to a team or an account; the public ones show nothing of anybody. */
const pages = inApp.filter((file) => file.endsWith('/page.tsx') && !/^app\/(\(public\)|local)\//.test(file))
const actionFiles = [...inApp, ...sources('components'), ...sources('lib'), ...sources('hooks')].filter((file) =>
  /^\s*['"]use server['"]/m.test(readFileSync(path.join(root, file), 'utf8')),
)

async function doorsOf(file: string): Promise<string[]> {
  if (file.endsWith('/page.tsx')) return [file]
  const exported = Object.keys((await import(/* @vite-ignore */ path.join(root, file))) as object)
  const methods = /^(GET|HEAD|POST|PUT|PATCH|DELETE|OPTIONS)$/
  return exported
    .filter((name) => (/\/route\.tsx?$/.test(file) ? methods.test(name) : true))
    .map((name) => `${file}#${name}`)
}

afterEach(() => vi.restoreAllMocks())

/** Sessions have their own tests; here somebody is simply signed in. */
const signedInAs = (userId: string | null) =>
  vi
    .spyOn(auth.api, 'getSession')
    .mockResolvedValue((userId && { user: { id: userId }, session: { id: newId() } }) as never)

describe('every route, page and action', () => {
  it('is found by looking for it', () => {
    expect([routes.length, pages.length, actionFiles.length].every((count) => count > 0)).toBe(true)
  })

  it('has a row in the table, and no row is of one that is gone', async () => {
    const found = (await Promise.all([...routes, ...pages, ...actionFiles].map(doorsOf))).flat()
    expect(found.sort()).toEqual([...Object.keys(doorTable), ...Object.keys(openToAnybody)].sort())
  })
})

describe.each(Object.entries(doorTable))('%s', (name, row: DoorRow) => {
  const isPage = name.endsWith('page.tsx')
  const byRole = (role: Role) => (row.may.includes(role) ? 'ok' : isPage ? 'notFound' : 'notAllowed')
  const expected = (byTeam: string) => row.answer ?? byTeam
  const knock = async (at: TestTeam, userId: string | null) => {
    const call = await row.prepare(at)
    const before = await fingerprint(at.id)
    signedInAs(userId)
    const answer = await answerOf(call)
    vi.restoreAllMocks()
    if (answer !== 'ok') expect(await fingerprint(at.id)).toBe(before)
    return answer
  }

  it.each(roles)('by a member who is %s', async (role) => {
    const at = await makeTeam()
    expect(await knock(at, at.people[role].userId)).toBe(expected(byRole(role)))
  })

  it.each(roles)('by a %s of another project', async (role) => {
    const at = await makeTeam()
    expect(await knock(at, at.elsewhere[role].userId)).toBe(expected(byRole(role)))
  })

  it.each(roles)('by a %s of another team, or let go', async (role) => {
    const [at, other] = [await makeTeam(), await makeTeam()]
    for (const { userId } of [other.people[role], at.gone[role]])
      expect(await knock(at, userId)).toBe(expected(row.ofTeam ? 'notFound' : 'ok'))
  })

  it('by nobody who is signed in', async () => {
    expect(await knock(await makeTeam(), null)).toBe(row.signedOut ?? 'signedOut')
  })
})

describe('every open door of better-auth', () => {
  it('has a row, and no row is of one that is closed', () => {
    expect(Object.keys(authDoors).sort()).toEqual([...openDoors].sort())
  })

  it.each(Object.entries(authDoors))('%s by who is signed out', async (door, { body, signedOut }) => {
    const [method, at = ''] = door.split(' ')
    const visitor = new Visitor()
    const response = method === 'GET' ? await visitor.get(at) : await visitor.post(at, body)
    expect(response.status).toBe(signedOut)
    expect(await visitor.isSignedIn()).toBe(false)
  })

  it.each(Object.entries(authDoors).filter(([door]) => door.startsWith('POST')))(
    '%s from a page of another site',
    async (door, { body }) => {
      const headers = { origin: 'https://elsewhere.example', cookie: 'better-auth.session_token=x.y' }
      const response = await new Visitor().post(door.split(' ')[1] ?? '', body, headers)
      expect(response.status).toBe(403)
    },
  )
})
