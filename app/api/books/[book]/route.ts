import { contextFrom } from '@/lib/auth/context'
import { getBook } from '@/lib/data/book/get-book'
import { handle } from '@/lib/http/handle'

type Parts = { params: Promise<{ book: string }> }

/** A whole book at its present number. */
export const GET = (request: Request, { params }: Parts) =>
  handle(request, 'book', async () => {
    const { book } = await params
    return getBook(await contextFrom(request.headers), { book })
  })
