import { NextRequest } from 'next/server'
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest'
import { GET as getChanges, POST as postChanges } from '@/app/api/books/[book]/changes/route'
import { GET as getSnapshot } from '@/app/api/books/[book]/route'
import { GET as getHealth } from '@/app/api/health/route'
import { auth } from '@/lib/auth/auth'
import { proxy } from '@/proxy'
import { change, component } from './records'
import { makeBook, makeTeam, type Person, type TestTeam } from './world'

const origin = 'http://127.0.0.1:3000'
let at: TestTeam
let book: string

beforeEach(async () => {
  at = await makeTeam()
  book = await makeBook(at)
})
afterEach(() => vi.restoreAllMocks())

/** Sessions have their own tests; here somebody is simply signed in. */
const signedInAs = (person: Person | null) =>
  vi.spyOn(auth.api, 'getSession').mockResolvedValue((person && { user: { id: person.userId } }) as never)

const parts = () => ({ params: Promise.resolve({ book }) })
const get = (path: string) => new Request(`${origin}/api/books/${book}${path}`)
const post = (body: BodyInit, headers: Record<string, string> = {}) =>
  new Request(`${origin}/api/books/${book}/changes`, {
    method: 'POST',
    headers: { 'content-type': 'application/json', origin, ...headers },
    body,
  })
const errorOf = async (response: Response) =>
  ((await response.json()) as { error: { code: string; message: string } }).error

describe('the routes of a book', () => {
  it('give the snapshot, write changes and list them', async () => {
    signedInAs(at.people.engineer)
    const made = change({ create: [component('W')] })
    const written = await postChanges(post(JSON.stringify({ changes: [made] })), parts())
    expect(await written.json()).toEqual({ number: 2, results: [{ id: made.id, ok: true, number: 2 }] })
    const listed = (await (await getChanges(get('/changes?after=1'), parts())).json()) as { changes: unknown[] }
    expect(listed).toMatchObject({
      number: 2,
      changes: [{ number: 2, change: made, by: { id: at.people.engineer.userId } }],
    })
    const snapshot = (await (await getSnapshot(get(''), parts())).json()) as { number: number; records: unknown[] }
    expect(snapshot.number).toBe(2)
    expect(snapshot.records).toContainEqual(made.create[0])
  })

  it('tell a conflict with both values as an answer, not as a failure', async () => {
    signedInAs(at.people.engineer)
    const twice = [
      change({ create: [component('W', 'same-place')] }),
      change({ create: [component('V', 'same-place')] }),
    ]
    const response = await postChanges(post(JSON.stringify({ changes: twice })), parts())
    expect(response.status).toBe(200)
    expect(await response.json()).toMatchObject({ number: 2, results: [{ ok: true }, { ok: false, code: 'conflict' }] })
  })

  it('refuse those who are signed out', async () => {
    signedInAs(null)
    const responses = [
      await getSnapshot(get(''), parts()),
      await getChanges(get('/changes?after=0'), parts()),
      await postChanges(post(JSON.stringify({ changes: [change({})] })), parts()),
    ]
    expect(responses.map(({ status }) => status)).toEqual([401, 401, 401])
  })

  it('refuse a reader, and do not find the book for another team', async () => {
    signedInAs(at.people.reader)
    expect((await getSnapshot(get(''), parts())).status).toBe(403)
    signedInAs((await makeTeam()).people.owner)
    expect((await getSnapshot(get(''), parts())).status).toBe(404)
    expect((await postChanges(post(JSON.stringify({ changes: [change({})] })), parts())).status).toBe(404)
  })

  it.each([
    undefined,
    'null',
    'https://elsewhere.example',
    'http://127.0.0.1:3001',
    'http://127.0.0.1:3000.elsewhere.example',
  ])('take no edits from a page of %s', async (from) => {
    signedInAs(at.people.engineer)
    const request = post(JSON.stringify({ changes: [change({ create: [component('W')] })] }))
    request.headers.delete('origin')
    if (from !== undefined) request.headers.set('origin', from)
    expect((await postChanges(request, parts())).status).toBe(403)
  })

  it.each([
    ['broken JSON', '{"changes":', /not valid JSON/],
    ['a list', '[]', /"changes"/],
    ['another key too', '{"changes":[],"book":"x"}', /"changes"/],
    ['null', 'null', /"changes"/],
    ['no list', '{"changes":7}', /form that a book takes/],
    ['a body that is too large', `"${'x'.repeat(24_000_001)}"`, /larger than 24 MB/],
  ])('refuse %s in a plain sentence', async (_, body, sentence) => {
    signedInAs(at.people.engineer)
    const response = await postChanges(post(body), parts())
    expect(response.status).toBe(400)
    expect((await errorOf(response)).message).toMatch(sentence)
  })

  it.each(['', '?after=', '?after=-1', '?after=x', '?after=1e3', '?after=99999999999'])(
    'want a number to list after, not "%s"',
    async (query) => {
      signedInAs(at.people.engineer)
      expect((await getChanges(get(`/changes${query}`), parts())).status).toBe(400)
    },
  )
})

it('health answers', async () => {
  const response = await getHealth(new Request(`${origin}/api/health`))
  expect([response.status, await response.json()]).toEqual([200, { status: 'ok' }])
})

describe('the proxy', () => {
  const visit = (path: string, cookie?: string) =>
    proxy(new NextRequest(`${origin}${path}`, cookie ? { headers: { cookie } } : {}))
  /** Path only: Next.js takes the two names of this machine for one, and answers with a path where the host is the same. */
  const sentTo = (response: Response) =>
    response.headers.get('location')?.replace(/^http:\/\/localhost:3000/, '') ?? null

  it.each([
    ['/kestrel', '/sign-in?next=%2Fkestrel'],
    ['/kestrel/books/abc?case=b', '/sign-in?next=%2Fkestrel%2Fbooks%2Fabc%3Fcase%3Db'],
  ])('sends a stranger from %s to sign in', (path, to) => expect(sentTo(visit(path))).toBe(to))

  it.each(['/', '/sign-in', '/sign-up', '/sample', '/favicon.ico', '/icon.svg', '/Kestrel', '/_next/x'])(
    'leaves %s alone',
    (path) => expect(sentTo(visit(path))).toBeNull(),
  )

  it('lets somebody with a session cookie through to where it is looked at', () => {
    expect(sentTo(visit('/kestrel', 'better-auth.session_token=x.y'))).toBeNull()
  })
})
