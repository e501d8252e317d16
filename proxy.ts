import { getSessionCookie } from 'better-auth/cookies'
import { type NextRequest, NextResponse } from 'next/server'
import { isTeamSlug } from '@/lib/auth/slugs'

/**
 * Sends those without a session cookie from a team's pages to the sign-in page, and does nothing else. It is a courtesy,
 * not a check: every verb of lib/data looks for itself who asks.
 */
export function proxy(request: NextRequest): NextResponse {
  const { pathname, search } = request.nextUrl
  const isTeamPage = isTeamSlug(pathname.split('/')[1] ?? '')
  if (!isTeamPage || getSessionCookie(request)) return NextResponse.next()
  const signIn = new URL('/sign-in', request.url)
  signIn.searchParams.set('next', pathname + search)
  return NextResponse.redirect(signIn)
}

/** Not api: a proxy cuts off large bodies. */
export const config = { matcher: ['/((?!api/|_next/).+)'] }
