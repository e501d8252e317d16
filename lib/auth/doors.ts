/**
 * The only paths of better-auth that answer requests from outside. Its other calls, those of organisations above all,
 * change teams without our permission table and audit: the verbs of lib/data do that work instead.
 */
const open = new Set([
  'POST /sign-up/email',
  'POST /sign-in/email',
  'POST /sign-out',
  'GET /get-session',
  'POST /get-session',
  'GET /ok',
])

export function isOpenDoor(method: string, pathname: string): boolean {
  const path = pathname.replace(/^\/api\/auth/, '').replace(/\/+$/, '')
  return open.has(`${method} ${path}`)
}
