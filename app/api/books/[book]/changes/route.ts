import { contextFrom } from '@/lib/auth/context'
import { fromOurPages } from '@/lib/auth/same-origin'
import { listChanges } from '@/lib/data/book/list-changes'
import { writeChanges } from '@/lib/data/book/write-changes'
import { fail } from '@/lib/errors'
import { handle } from '@/lib/http/handle'
import { readJson } from '@/lib/http/read-json'

type Parts = { params: Promise<{ book: string }> }

/** A paste of a large sheet is one change: this holds about 60,000 records. */
const mostBytes = 24_000_000

/** The changes after a number, in order. */
export const GET = (request: Request, { params }: Parts) =>
  handle(request, 'changes', async () => {
    const { book } = await params
    const after = new URL(request.url).searchParams.get('after') ?? ''
    if (!/^\d{1,9}$/.test(after)) return fail('badInput', 'Say after which change: ?after= and a whole number.')
    return listChanges(await contextFrom(request.headers), { book, after: Number(after) })
  })

/** Writes changes: `{ changes: [...] }`. */
export const POST = (request: Request, { params }: Parts) =>
  handle(request, 'write changes', async () => {
    const ours = fromOurPages(request.headers)
    if (!ours.ok) return ours
    const ctx = await contextFrom(request.headers)
    if (ctx.userId === null) return fail('signedOut', 'You are signed out. Sign in to go on.')
    const body = await readJson(request, mostBytes)
    if (!body.ok) return body
    if (typeof body.value !== 'object' || body.value === null || Object.keys(body.value).join() !== 'changes')
      return fail('badInput', 'Send an object that holds "changes", a list.')
    const { changes } = body.value as { changes: never }
    const { book } = await params
    return writeChanges(ctx, { book, changes })
  })
