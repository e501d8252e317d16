import type { Metadata } from 'next'
import { headers } from 'next/headers'
import { redirect } from 'next/navigation'
import { EmailForm } from '@/components/account/email-form'
import { NameForm } from '@/components/account/name-form'
import { PasswordForm } from '@/components/account/password-form'
import { SecondFactor } from '@/components/account/second-factor'
import { SessionsList } from '@/components/account/sessions-list'
import { FrontHeader } from '@/components/front/front-header'
import { contextFrom } from '@/lib/auth/context'
import { getAccount } from '@/lib/data/account/get-account'
import { listMySessions } from '@/lib/data/account/list-my-sessions'
import { changeName, endOtherSessions, endSession } from './actions'

export const metadata: Metadata = { title: 'Your account' }

/** One's own account, in no team. */
export default async function AccountPage() {
  const ctx = await contextFrom(await headers())
  const [account, sessions] = await Promise.all([getAccount(ctx, {}), listMySessions(ctx, {})])
  if (!account.ok || !sessions.ok) redirect('/sign-in?next=/account')
  return (
    <div className="flex min-h-dvh flex-col">
      <FrontHeader isSignedIn />
      <main id="main" className="mx-auto grid w-full max-w-[680px] gap-5 px-5 pt-4 pb-16">
        <header>
          <h1 className="text-[1.75rem] leading-tight">Your account</h1>
          <p className="mt-1.5 text-ink-2">It is the same in all of your teams.</p>
        </header>
        <NameForm name={account.value.name} changeName={changeName} />
        <EmailForm email={account.value.email} />
        <PasswordForm email={account.value.email} />
        <SecondFactor isOn={account.value.hasSecondFactor} />
        <SessionsList sessions={sessions.value} actions={{ endSession, endOtherSessions }} />
      </main>
    </div>
  )
}
