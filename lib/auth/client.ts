import { twoFactorClient } from 'better-auth/client/plugins'
import { createAuthClient } from 'better-auth/react'

/**
 * For the browser: signing up, in and out, and one's own account. What a person may do is decided on the server, never
 * here. Its calls are the open doors of doors.ts.
 */
export const authClient = createAuthClient({ plugins: [twoFactorClient()] })

/** Asks for another address, which then gets a mail to confirm it. The password is asked for again. */
export const changeAddress = (newEmail: string, password: string) =>
  authClient.$fetch<{ status: boolean }>('/change-email', { method: 'POST', body: { newEmail, password } })
