'use client'

import { ArrowRight } from 'lucide-react'

export type DemoAccountsProps = {
  accounts: readonly { role: string; email: string }[]
  password: string
  onPick: (email: string, password: string) => void
}

const may: Record<string, string> = {
  owner: 'Everything, members and projects too',
  engineer: 'Makes and edits books',
  analyst: 'Laboratory: edits no book',
  checker: 'Reads everything, to check it',
  reader: 'Operations or client: reads what was issued',
}

/** The accounts that come with a copy on somebody's own machine, one press each. */
export function DemoAccounts({ accounts, password, onPick }: DemoAccountsProps) {
  return (
    <section aria-labelledby="demo-accounts" className="grid gap-2">
      <h2 id="demo-accounts" className="text-md">
        Or look round the demo team
      </h2>
      <p className="text-ink-2">
        This copy runs on your own machine, with invented plants. The password of each is{' '}
        <code className="font-mono text-sm text-ink">{password}</code>.
      </p>
      <ul className="mt-1 border-t border-hair">
        {accounts.map(({ role, email }) => (
          <li key={email} className="border-b border-hair">
            <button
              type="button"
              onClick={() => onPick(email, password)}
              className="group grid w-full grid-cols-[5.5rem_1fr_auto] items-center gap-x-3 rounded-md px-2 py-2 text-start hover:bg-brook-wash"
            >
              <span className="font-semibold first-letter:uppercase">{role}</span>
              <span className="min-w-0 text-sm text-ink-2">
                <span className="block truncate text-ink">{email}</span>
                {may[role]}
              </span>
              <ArrowRight className="size-4 text-ink-3 group-hover:text-brook" aria-hidden="true" />
            </button>
          </li>
        ))}
      </ul>
    </section>
  )
}
