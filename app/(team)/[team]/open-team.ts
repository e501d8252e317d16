import { headers } from 'next/headers'
import { notFound, redirect } from 'next/navigation'
import { cache } from 'react'
import { type Context, contextFrom } from '@/lib/auth/context'
import { getTeam, type TeamView } from '@/lib/data/team/get-team'
import type { AppError, Result } from '@/lib/errors'

/** Asked once a request, by the frame and by the page in it. */
export const requestContext = cache(async (): Promise<Context> => contextFrom(await headers()))
export const readTeam = cache(
  async (slug: string): Promise<Result<TeamView>> => getTeam(await requestContext(), { team: slug }),
)

/** The team of the address, for a page at `path`; signed out or not in it, the page is left. */
export async function openTeam(slug: string, path: string): Promise<{ ctx: Context; team: TeamView }> {
  return { ctx: await requestContext(), team: valueFor(await readTeam(slug), path) }
}

/** What a verb gave, for a page at `path`: a refusal leads to signing in or to "not found", a fault to the error page. */
export function valueFor<T>(result: Result<T>, path: string): T {
  if (result.ok) return result.value
  leave(result.error, path)
}

function leave(error: AppError, path: string): never {
  if (error.code === 'signedOut') redirect(`/sign-in?next=${encodeURIComponent(path)}`)
  if (error.code === 'notFound' || error.code === 'notAllowed' || error.code === 'badInput') notFound()
  throw new Error(`${error.code}: ${error.message}`, { cause: error })
}
