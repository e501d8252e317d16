import { longestPassword, shortestPassword } from '@/lib/auth/password'

type AuthFault = { code?: string | undefined; status?: number | undefined; message?: string | undefined }

const known: Record<string, string> = {
  INVALID_EMAIL_OR_PASSWORD: 'This e-mail and password do not belong together. Check both, or make an account.',
  USER_ALREADY_EXISTS: 'There is already an account with this e-mail. Sign in instead.',
  USER_ALREADY_EXISTS_USE_ANOTHER_EMAIL: 'There is already an account with this e-mail. Sign in instead.',
  INVALID_EMAIL: 'This is not an e-mail address. It looks like name@company.com.',
  PASSWORD_TOO_SHORT: `The password is too short: use ${shortestPassword} characters or more.`,
  PASSWORD_TOO_LONG: `The password is too long: use ${longestPassword} characters or fewer.`,
}

/** What went wrong with signing in or up, and what to do, as a plain sentence. */
export function signFault(fault: AuthFault): string {
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
