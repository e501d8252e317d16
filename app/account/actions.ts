'use server'

import { perform } from '@/app/perform'
import * as name from '@/lib/data/account/change-name'
import * as endOthers from '@/lib/data/account/end-other-sessions'
import * as end from '@/lib/data/account/end-session'

/** The small forms of one's own account. */
const shownAt = { path: '/account', kind: 'page' } as const

export async function changeName(input: { name: string }) {
  return perform((ctx) => name.changeName(ctx, input), shownAt)
}

export async function endSession(input: { session: string }) {
  return perform((ctx) => end.endSession(ctx, input), shownAt)
}

export async function endOtherSessions() {
  return perform((ctx) => endOthers.endOtherSessions(ctx, {}), shownAt)
}
