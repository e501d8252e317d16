'use server'

import { perform } from '@/app/perform'
import * as accept from '@/lib/data/invitation/accept-invitation'
import * as join from '@/lib/data/invitation/sign-up-and-accept'

/** What the page behind an invitation's link can have done. It is left then, so nothing is read anew. */
export async function acceptInvitation(input: { token: string }) {
  return perform((ctx) => accept.acceptInvitation(ctx, input))
}

export async function signUpAndAccept(input: { token: string; name: string; password: string }) {
  return perform((ctx) => join.signUpAndAccept(ctx, input))
}
