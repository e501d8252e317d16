'use client'

import Link from 'next/link'
import { useState } from 'react'
import { Button, buttonClasses } from '@/components/ui/button'
import { ErrorSummary } from '@/components/ui/error-summary'
import { authClient } from '@/lib/auth/client'
import { DoneNote } from './done-note'
import { useAuthCall } from './use-auth-call'

type VerifyFormProps = { token: string; isSignedIn: boolean }

const useless = ['INVALID_TOKEN', 'TOKEN_EXPIRED', 'USER_NOT_FOUND']

/** Confirms an address at the press of a button: programs that open the links in mails confirm nothing. */
export function VerifyForm({ token, isSignedIn }: VerifyFormProps) {
  const { call, isBusy, problems } = useAuthCall()
  const [end, setEnd] = useState<'done' | 'useless' | 'taken' | null>(null)

  const confirm = async () => {
    const answer = await call(() => authClient.verifyEmail({ query: { token } }))
    if (answer.ok) setEnd('done')
    else if (answer.code === 'ADDRESS_TAKEN') setEnd('taken')
    else if (answer.code && useless.includes(answer.code)) setEnd('useless')
  }

  const goOn = isSignedIn ? (
    <Link href="/account" prefetch={false} className={buttonClasses('main')}>
      Go to your account
    </Link>
  ) : (
    <Link href="/sign-in" className={buttonClasses('main')}>
      Sign in
    </Link>
  )
  if (end === 'done')
    return (
      <DoneNote title="Your address is confirmed">
        <p>{isSignedIn ? 'It is the one that you sign in with.' : 'You can sign in with it now.'}</p>
        {goOn}
      </DoneNote>
    )
  if (end === 'taken')
    return (
      <DoneNote title="Another account has this address by now">
        <p>Your account keeps the address that it had. Choose another one on your account page.</p>
        {goOn}
      </DoneNote>
    )
  if (end === 'useless')
    return (
      <DoneNote title="This link is of no use any more">
        <p>
          It was used already, or it is older than a day. If the address is not confirmed yet, sign in: a new link is
          then mailed to it.
        </p>
        {goOn}
      </DoneNote>
    )
  return (
    <div className="sheet grid gap-4 p-5 sm:p-6">
      <ErrorSummary problems={problems} title="Nothing was confirmed" />
      <p>Press the button to confirm that the mail with this link came to you.</p>
      <Button look="main" size="large" busy={isBusy} onClick={() => void confirm()}>
        {isBusy ? 'Confirming' : 'Confirm this address'}
      </Button>
    </div>
  )
}
