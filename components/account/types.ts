import type { AccountView } from '@/lib/data/account/get-account'
import type { SessionView } from '@/lib/data/account/list-my-sessions'
import type { Result } from '@/lib/errors'

export type Account = AccountView
export type SessionRow = SessionView

/** What somebody can have done with their own account beyond the doors of the sign-in service; server actions. */
export type AccountActions = {
  changeName: (input: { name: string }) => Promise<Result<{ name: string }>>
  endSession: (input: { session: string }) => Promise<Result<unknown>>
  endOtherSessions: () => Promise<Result<{ ended: number }>>
}
