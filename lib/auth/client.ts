import { createAuthClient } from 'better-auth/react'

/** For the browser: signing up, in and out. What a person may do is decided on the server, never here. */
export const authClient = createAuthClient()
