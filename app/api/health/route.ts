import { databaseAnswers } from '@/lib/data/door/health'
import { fail, ok } from '@/lib/errors'
import { handle } from '@/lib/http/handle'

export const dynamic = 'force-dynamic'

/** For whatever watches the server: 200 while it can serve, 503 while its database does not answer. */
export const GET = (request: Request) =>
  handle(request, 'health', async () =>
    (await databaseAnswers()) ? ok({ status: 'ok' }) : fail('unavailable', 'The database does not answer.'),
  )
