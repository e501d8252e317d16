import { fail, ok } from '@/lib/errors'
import { handle } from '@/lib/http/handle'
import { linksIn, standInFolder, standInMails } from '@/lib/mail/stand-in'

/** The mails of the stand-in, the newest first, for tests; `?to=` narrows them to one address. Local mode only. */
export const GET = (request: Request) =>
  handle(request, 'local mail', async () => {
    const folder = standInFolder(request.headers.get('host'))
    if (folder === null) return fail('notFound', 'There is nothing at this address.')
    const to = new URL(request.url).searchParams.get('to') ?? undefined
    const mails = await standInMails(folder, to)
    return ok({ messages: mails.map((mail) => ({ ...mail, links: linksIn(mail.text) })) })
  })
