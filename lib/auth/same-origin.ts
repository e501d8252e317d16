import { env } from '@/lib/env'
import { fail, ok, type Result } from '@/lib/errors'
import { trustedOrigins } from './trusted-origins'

/**
 * A browser tells with every POST which site's page sent it. Only ours may edit: another site's page could otherwise use
 * the cookie of somebody who is signed in here.
 */
export function fromOurPages(headers: Headers): Result<undefined> {
  const origin = headers.get('origin')
  if (origin !== null && trustedOrigins(env.authUrl, env.isLocal).includes(origin)) return ok()
  return fail('notAllowed', 'Edits are taken from pages of this site only.')
}
