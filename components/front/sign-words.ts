import { longestPassword, shortestPassword } from '@/lib/auth/password'

export type AuthFault = { code?: string | undefined; status?: number | undefined; message?: string | undefined }

const known: Record<string, string> = {
  INVALID_EMAIL_OR_PASSWORD: 'This e-mail and password do not belong together. Check both, or make an account.',
  EMAIL_NOT_VERIFIED: 'This address is not confirmed yet. A mail with a new link is on its way: use it, then sign in.',
  INVALID_PASSWORD: 'This is not your present password.',
  INVALID_CODE: 'This code is not right, or its half minute is over. Type the one that is shown now.',
  INVALID_BACKUP_CODE: 'This backup code is not right, or has been used before.',
  TOO_MANY_ATTEMPTS_REQUEST_NEW_CODE: 'Too many wrong codes. Begin again with your password.',
  ACCOUNT_TEMPORARILY_LOCKED: 'Too many wrong codes. Wait a quarter of an hour, then begin again with your password.',
  INVALID_TWO_FACTOR_COOKIE: 'The time for typing the code is over. Begin again with your password.',
  INVALID_USER: 'You are signed in with another account. Sign out first, then use the link again.',
  SESSION_EXPIRED: 'You are signed out. Sign in again, then go on.',
  UNAUTHORIZED: 'You are signed out. Sign in again, then go on.',
  INVALID_EMAIL: 'This is not an e-mail address. It looks like name@company.com.',
  PASSWORD_TOO_SHORT: `The password is too short: use ${shortestPassword} characters or more.`,
  PASSWORD_TOO_LONG: `The password is too long: use ${longestPassword} characters or fewer.`,
}

/** What went wrong with signing in or up or with one's account, and what to do, as a plain sentence. */
export function signFault(fault: AuthFault): string {
  if (fault.code === 'TOO_MANY_TRIES' && fault.message) return fault.message
  if (fault.status === 429) return 'Too many tries in a short time. Wait a minute, then try again.'
  const sentence = fault.code ? known[fault.code] : undefined
  if (sentence) return sentence
  if (fault.status !== undefined && fault.status >= 500)
    return 'The server could not do this just now. Nothing was changed; try again in a moment.'
  if (fault.code === 'INVALID_NAME' && fault.message) return fault.message
  return fault.message
    ? `This was refused: ${fault.message}.`
    : 'The server did not answer. Check your connection and try again.'
}

const emailShape = /^[^\s@]+@[^\s@]+\.[^\s@]+$/

export function emailProblem(email: string): string | undefined {
  if (email === '') return 'Type your e-mail address.'
  return emailShape.test(email) ? undefined : 'This is not an e-mail address. It looks like name@company.com.'
}

export function newPasswordProblem(password: string): string | undefined {
  if (password === '') return 'Choose a password.'
  return password.length < shortestPassword
    ? `The password is too short: use ${shortestPassword} characters or more.`
    : undefined
}
