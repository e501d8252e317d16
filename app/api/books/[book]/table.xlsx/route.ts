import { contextFrom } from '@/lib/auth/context'
import { exportStreamTable } from '@/lib/data/book/export-stream-table'
import { attachment } from '@/lib/export/file-name'
import { handle } from '@/lib/http/handle'

type Parts = { params: Promise<{ book: string }> }

const workbookType = 'application/vnd.openxmlformats-officedocument.spreadsheetml.sheet'

/** The stream table of a book as a download; `?case=` names an operating case, left out: the first. */
export const GET = (request: Request, { params }: Parts) =>
  handle(request, 'stream table file', async () => {
    const { book } = await params
    const operatingCase = new URL(request.url).searchParams.get('case')
    const file = await exportStreamTable(await contextFrom(request.headers), {
      book,
      ...(operatingCase !== null && { case: operatingCase }),
    })
    if (!file.ok) return file
    const { name, bytes } = file.value
    return new Response(bytes, {
      headers: {
        'content-type': workbookType,
        'content-disposition': attachment(name),
        'content-length': String(bytes.byteLength),
        'cache-control': 'no-store',
        'x-content-type-options': 'nosniff',
      },
    })
  })
