'use client'

import { type FormEvent, useState } from 'react'
import { emailProblem } from '@/components/front/sign-words'
import { Button } from '@/components/ui/button'
import { ErrorSummary, type FormProblem } from '@/components/ui/error-summary'
import { Field, Input } from '@/components/ui/field'
import { changeAddress } from '@/lib/auth/client'
import { AccountPart } from './account-part'
import { PresentPasswordField } from './present-password-field'
import { useAuthCall } from './use-auth-call'

/** Asks for another address. It counts once the link mailed to it is used; until then the present one stays. */
export function EmailForm({ email }: { email: string }) {
  const { call, isBusy, problems, setProblems, wrong } = useAuthCall()
  const [waiting, setWaiting] = useState<string | null>(null)

  const submit = async (event: FormEvent<HTMLFormElement>) => {
    event.preventDefault()
    const form = event.currentTarget
    const data = new FormData(form)
    const wanted = String(data.get('new-email') ?? '').trim()
    const password = String(data.get('email-password') ?? '')
    const found: FormProblem[] = []
    const problem = wanted.toLowerCase() === email ? 'This is your address already.' : emailProblem(wanted)
    if (problem) found.push({ field: 'new-email', text: problem })
    if (password === '') found.push({ field: 'email-password', text: 'Type your password.' })
    setProblems(found)
    if (found.length > 0) return
    const fields = { INVALID_PASSWORD: 'email-password', INVALID_EMAIL: 'new-email' }
    const answer = await call(() => changeAddress(wanted, password), fields)
    if (!answer.ok) return
    setWaiting(wanted)
    form.reset()
  }

  return (
    <AccountPart
      title="E-mail"
      intro={
        <>
          You sign in with <strong className="wrap-anywhere text-ink">{email}</strong>.
        </>
      }
    >
      {waiting === null ? null : (
        <p role="status" className="rounded-control border border-given-edge bg-given px-3.5 py-2.5">
          <strong className="wrap-anywhere">{waiting}</strong> waits to be confirmed: a mail with a link is on its way
          to it. Until the link is used, your address stays as it is.
        </p>
      )}
      <form onSubmit={submit} noValidate className="grid gap-4">
        <ErrorSummary problems={problems} title={problems.some((p) => p.field) ? undefined : 'Nothing was changed'} />
        <Field id="new-email" label="New address" error={wrong('new-email')}>
          {(field) => <Input {...field} name="new-email" type="email" autoComplete="email" inputMode="email" />}
        </Field>
        <PresentPasswordField id="email-password" error={wrong('email-password')} />
        <Button type="submit" busy={isBusy} className="justify-self-start">
          Change the address
        </Button>
      </form>
    </AccountPart>
  )
}
