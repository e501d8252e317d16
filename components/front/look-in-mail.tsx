'use client'

import { useState } from 'react'
import { DoneNote } from '@/components/account/done-note'
import { useAuthCall } from '@/components/account/use-auth-call'
import { Button } from '@/components/ui/button'
import { ErrorSummary } from '@/components/ui/error-summary'
import { authClient } from '@/lib/auth/client'

/** After signing up: what to do next, and what to do when no mail comes. */
export function LookInMail({ email, onOther }: { email: string; onOther: () => void }) {
  const { call, isBusy, problems } = useAuthCall()
  const [isAgain, setAgain] = useState(false)

  const sendAgain = async () => {
    const answer = await call(() => authClient.sendVerificationEmail({ email }))
    if (answer.ok) setAgain(true)
  }

  return (
    <DoneNote title="Now look in your mail">
      <p>
        A mail is on its way to <strong className="wrap-anywhere">{email}</strong>. Use the link in it to confirm that
        the address is yours, then sign in.
      </p>
      <p className="text-ink-2">It may take a minute, and it may land among unwanted mail.</p>
      <ErrorSummary problems={problems} title="No mail was sent" />
      <p role="status" className="text-ink-2">
        {isAgain ? 'If this address waits to be confirmed, the mail is on its way again.' : ''}
      </p>
      <div className="flex flex-wrap gap-2">
        <Button busy={isBusy} onClick={() => void sendAgain()}>
          Send it again
        </Button>
        <Button look="quiet" onClick={onOther}>
          The address is wrong
        </Button>
      </div>
    </DoneNote>
  )
}
