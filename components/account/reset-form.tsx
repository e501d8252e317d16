'use client'

import Link from 'next/link'
import { type FormEvent, useState } from 'react'
import { newPasswordProblem } from '@/components/front/sign-words'
import { Button, buttonClasses } from '@/components/ui/button'
import { ErrorSummary } from '@/components/ui/error-summary'
import { authClient } from '@/lib/auth/client'
import { DoneNote } from './done-note'
import { NewPasswordField } from './new-password-field'
import { useAuthCall } from './use-auth-call'

/** Chooses a new password by the token of a mailed link. */
export function ResetForm({ token }: { token: string }) {
  const { call, isBusy, problems, setProblems, wrong } = useAuthCall()
  const [end, setEnd] = useState<'done' | 'useless' | null>(null)

  const submit = async (event: FormEvent<HTMLFormElement>) => {
    event.preventDefault()
    const newPassword = String(new FormData(event.currentTarget).get('new-password') ?? '')
    const problem = newPasswordProblem(newPassword)
    if (problem) return setProblems([{ field: 'new-password', text: problem }])
    const fields = { PASSWORD_TOO_SHORT: 'new-password', PASSWORD_TOO_LONG: 'new-password' }
    const answer = await call(() => authClient.resetPassword({ newPassword, token }), fields)
    if (answer.ok) setEnd('done')
    else if (answer.code === 'INVALID_TOKEN') setEnd('useless')
  }

  if (end === 'done')
    return (
      <DoneNote title="Your password is changed">
        <p>You were signed out everywhere. Sign in with the new password.</p>
        <Link href="/sign-in" className={buttonClasses('main')}>
          Sign in
        </Link>
      </DoneNote>
    )
  if (end === 'useless')
    return (
      <DoneNote title="This link is of no use any more">
        <p>
          It was used already, it is older than an hour, or the password was changed since. Nothing was changed now.
        </p>
        {/* The same page without the token: a whole load, so that this form is gone. */}
        <a href="/reset" className={buttonClasses('main')}>
          Ask for a new link
        </a>
      </DoneNote>
    )
  return (
    <form onSubmit={submit} noValidate className="sheet grid gap-4 p-5 sm:p-6">
      <ErrorSummary problems={problems} title={problems.some((p) => p.field) ? undefined : 'Nothing was changed'} />
      <NewPasswordField id="new-password" label="New password" error={wrong('new-password')} />
      <Button type="submit" look="main" size="large" busy={isBusy}>
        {isBusy ? 'Changing the password' : 'Change the password'}
      </Button>
    </form>
  )
}
