'use server'

import { perform } from '@/app/perform'
import * as create from '@/lib/data/team/create-team'
import * as leave from '@/lib/data/team/leave-team'

/** The small forms of the person's menu. The page is left then, so nothing is read anew. */
export async function createTeam(input: { name: string }) {
  return perform((ctx) => create.createTeam(ctx, input))
}

export async function leaveTeam(team: string) {
  return perform((ctx) => leave.leaveTeam(ctx, { team }))
}
