import type { Role } from '@/lib/auth/permissions'
import type { ErrorCode, Result } from '@/lib/errors'
import { httpStatus } from '@/lib/errors'
import { codeOf, makeBook, type TestTeam } from './world'

/** What a page gives: anything that can be drawn. */
class Shown {}
type Answer = Response | Result<unknown> | Shown

/** How one door is knocked at; see the table of doors. */
export type DoorRow = {
  may: readonly Role[]
  /** Belongs to a team, so that other teams' people do not find it. */
  ofTeam: boolean
  /** What everybody gets who is signed in, and what who is signed out; left out: by role, and that they are. */
  answer?: string
  signedOut?: string
  /** The call, ready to be made by whoever is signed in then. */
  prepare: (at: TestTeam) => Promise<() => Promise<Answer>>
}

export const everyone: readonly Role[] = ['owner', 'engineer', 'analyst', 'checker', 'reader']
export const makers: readonly Role[] = ['owner', 'engineer']
export const openers: readonly Role[] = ['owner', 'engineer', 'checker']
export const owners: readonly Role[] = ['owner']

const origin = 'http://127.0.0.1:3000'
const codes: ErrorCode[] = ['signedOut', 'notAllowed', 'notFound', 'badInput', 'conflict', 'tooMany', 'internal']

/** 'ok', or the code of what somebody met instead. */
export async function answerOf(call: () => Promise<Answer>): Promise<string> {
  try {
    const answer = await call()
    if (answer instanceof Shown) return 'ok'
    if (!(answer instanceof Response)) return codeOf(answer)
    return answer.ok ? 'ok' : (codes.find((code) => httpStatus(code) === answer.status) ?? String(answer.status))
  } catch (cause) {
    const digest = cause instanceof Error && 'digest' in cause ? String(cause.digest) : ''
    if (digest.startsWith('NEXT_REDIRECT') && digest.includes(';/sign-in?next=')) return 'signedOut'
    if (digest.endsWith(';404')) return 'notFound'
    throw cause
  }
}

type BookRoute = (request: Request, parts: { params: Promise<{ book: string }> }) => Promise<Response>

/** A method of a route under `/api/books/[book]`. */
export const bookRoute = (
  may: readonly Role[],
  handler: () => Promise<BookRoute>,
  path: string,
  body?: () => unknown,
): DoorRow => ({
  may,
  ofTeam: true,
  prepare: async (at) => {
    const [book, answer] = [await makeBook(at), await handler()]
    const headers = { origin, 'content-type': 'application/json' }
    const init = body ? { method: 'POST', headers, body: JSON.stringify(body()) } : {}
    const request = new Request(`${origin}/api/books/${book}${path}`, init)
    return () => answer(request, { params: Promise.resolve({ book }) })
  },
})

/** A page of a team. `partsOf`: the other parts of its address. It is called, not drawn: what it shows is not looked at. */
export const teamPage = (
  may: readonly Role[],
  module: () => Promise<unknown>,
  partsOf?: (at: TestTeam) => Promise<Record<string, string>>,
): DoorRow => ({
  may,
  ofTeam: true,
  prepare: async (at) => {
    const parts = { team: at.slug, ...(await partsOf?.(at)) }
    const { default: Page } = (await module()) as { default: (props: object) => Promise<unknown> }
    return async () => {
      await Page({ params: Promise.resolve(parts), searchParams: Promise.resolve({}) })
      return new Shown()
    }
  },
})

type Call<A, T> = (actions: A, at: TestTeam, ready: T) => Promise<Result<unknown>>

/** For the actions of one file; `ready` is what a call needs to find in the team. */
export const actionsOf =
  <A>(module: () => Promise<A>) =>
  <T = undefined>(may: readonly Role[], call: Call<A, T>, ready?: (at: TestTeam) => Promise<T>): DoorRow => ({
    may,
    ofTeam: true,
    prepare: async (at) => {
      const [actions, found] = [await module(), (await ready?.(at)) as T]
      return () => call(actions, at, found)
    },
  })
