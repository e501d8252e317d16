import seed from '@/db/seed/demo-accounts.json'
import { env } from '@/lib/env'

export type DemoAccounts = { password: string; accounts: readonly { role: string; email: string }[] }

/** The accounts that the seed makes, for the sign-in page of a copy on somebody's own machine; null anywhere else. */
export function demoAccounts(): DemoAccounts | null {
  return env.isLocal ? seed : null
}
