/**
 * The only paths of better-auth that answer requests from outside. Its other calls, those of organisations above all,
 * change teams without our permission table and audit: the verbs of lib/data do that work instead.
 */
export const openDoors: ReadonlySet<string> = new Set([
  'POST /sign-up/email',
  'POST /sign-in/email',
  'POST /sign-out',
  'GET /get-session',
  'POST /get-session',
  'GET /ok',
  'POST /send-verification-email',
  'GET /verify-email',
  'POST /request-password-reset',
  'POST /reset-password',
  'POST /change-password',
  'POST /change-email',
  'POST /two-factor/enable',
  'POST /two-factor/disable',
  'POST /two-factor/verify-totp',
  'POST /two-factor/verify-backup-code',
  'POST /two-factor/generate-backup-codes',
])

export function isOpenDoor(method: string, pathname: string): boolean {
  return openDoors.has(`${method} ${pathIn(pathname)}`)
}

/** Milliseconds that an answer takes at least: longer than any work behind it that depends on whether an account exists. */
const leastTime: Record<string, number> = { 'POST /sign-up/email': 600, 'POST /request-password-reset': 400 }

export function leastTimeOf(method: string, pathname: string): number {
  return leastTime[`${method} ${pathIn(pathname)}`] ?? 0
}

const pathIn = (pathname: string) => pathname.replace(/^\/api\/auth/, '').replace(/\/+$/, '')
