import { setTimeout as wait } from 'node:timers/promises'
import { toNextJsHandler } from 'better-auth/next-js'
import { auth } from '@/lib/auth/auth'
import { isOpenDoor, leastTimeOf } from '@/lib/auth/doors'
import { fail } from '@/lib/errors'
import { handle } from '@/lib/http/handle'

const handlers = toNextJsHandler(auth)

async function answer(request: Request, method: 'GET' | 'POST'): Promise<Response> {
  return handle(request, 'auth', async () => {
    const { pathname } = new URL(request.url)
    if (!isOpenDoor(method, pathname)) return fail('notFound', 'There is nothing at this address.')
    const [response] = await Promise.all([handlers[method](request), wait(leastTimeOf(method, pathname))])
    // better-auth answers what it did not expect with an empty body, having logged it.
    return response.status < 500 ? response : fail('internal', `better-auth answered ${response.status}`)
  })
}

export const GET = (request: Request) => answer(request, 'GET')
export const POST = (request: Request) => answer(request, 'POST')
