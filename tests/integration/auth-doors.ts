import { newAddress } from './post-box'
import { password } from './visitor'

type AuthDoor = {
  body: Record<string, unknown>
  /** The status that who is signed out gets for it: 401 wherever it is about one's own account. */
  signedOut: number
}

const account = (body: Record<string, unknown>): AuthDoor => ({ body, signedOut: 401 })

/** One row for each path of better-auth that answers from outside. What they do is in the tests of accounts. */
export const authDoors: Record<string, AuthDoor> = {
  'POST /sign-up/email': { body: { name: 'Ada', email: newAddress(), password }, signedOut: 200 },
  'POST /sign-in/email': { body: { email: newAddress(), password }, signedOut: 401 },
  'POST /sign-out': { body: {}, signedOut: 200 },
  'GET /get-session': { body: {}, signedOut: 200 },
  'POST /get-session': { body: {}, signedOut: 405 },
  'GET /ok': { body: {}, signedOut: 200 },
  'POST /send-verification-email': { body: { email: newAddress() }, signedOut: 200 },
  'GET /verify-email': { body: {}, signedOut: 400 },
  'POST /request-password-reset': { body: { email: newAddress() }, signedOut: 200 },
  'POST /reset-password': { body: { token: 'x', newPassword: password }, signedOut: 400 },
  'POST /change-password': account({ currentPassword: password, newPassword: password }),
  'POST /change-email': account({ newEmail: newAddress(), password }),
  'POST /two-factor/enable': account({ password }),
  'POST /two-factor/disable': account({ password }),
  'POST /two-factor/verify-totp': account({ code: '123456' }),
  'POST /two-factor/verify-backup-code': account({ code: 'AAAAA-AAAAA' }),
  'POST /two-factor/generate-backup-codes': account({ password }),
}
