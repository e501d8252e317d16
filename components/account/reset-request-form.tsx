'use client'

import { type FormEvent, useState } from 'react'
import { emailProblem } from '@/components/front/sign-words'
import { Button } from '@/components/ui/button'
import { ErrorSummary } from '@/components/ui/error-summary'
import { Field, Input } from '@/components/ui/field'
import { authClient } from '@/lib/auth/client'
import { DoneNote } from './done-note'
import { useAuthCall } from './use-auth-call'

/** Asks for a link to choose a new password. What it answers does not depend on whether the address is known. */
export function ResetRequestForm() {
  const { call, isBusy, problems, setProblems, wrong } = useAuthCall()
  const [sentTo, setSentTo] = useState<string | null>(null)

  const submit = async (event: FormEvent<HTMLFormElement>) => {
    event.preventDefault()
    const email = String(new FormData(event.currentTarget).get('email') ?? '').trim()
    const problem = emailProblem(email)
    if (problem) return setProblems([{ field: 'email', text: problem }])
    const answer = await call(() => authClient.requestPasswordReset({ email }), { INVALID_EMAIL: 'email' })
    if (answer.ok) setSentTo(email)
  }

  if (sentTo !== null)
    return (
      <DoneNote title="Look in your mail">
        <p>
          If there is an account with <strong className="wrap-anywhere">{sentTo}</strong>, a mail with a link to choose
          a new password is on its way to it. The link works once, within the hour.
        </p>
        <p className="text-ink-2">
          No mail within a few minutes? Look among unwanted mail, and check the address: another one may be that of your
          account.
        </p>
        <Button onClick={() => setSentTo(null)}>Try another address</Button>
      </DoneNote>
    )
  return (
    <form onSubmit={submit} noValidate className="sheet grid gap-4 p-5 sm:p-6">
      <ErrorSummary problems={problems} title={problems.some((p) => p.field) ? undefined : 'No mail was sent'} />
      <Field id="email" label="E-mail" hint="The one that you sign in with." error={wrong('email')}>
        {(field) => <Input {...field} name="email" type="email" autoComplete="username" inputMode="email" />}
      </Field>
      <Button type="submit" look="main" size="large" busy={isBusy}>
        {isBusy ? 'Sending' : 'Mail me a link'}
      </Button>
    </form>
  )
}
