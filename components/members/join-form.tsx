'use client'

import { type FormEvent, useState } from 'react'
import { NewPasswordField } from '@/components/account/new-password-field'
import { newPasswordProblem } from '@/components/front/sign-words'
import { Button } from '@/components/ui/button'
import { ErrorSummary, type FormProblem } from '@/components/ui/error-summary'
import { Field, Input } from '@/components/ui/field'
import { useAction } from '@/components/ui/use-action'
import { authClient } from '@/lib/auth/client'
import { nameProblem } from '@/lib/auth/person-name'
import type { InvitationActions } from './types'

type JoinFormProps = { email: string; token: string; join: InvitationActions['signUpAndAccept'] }

/** Makes the account of an invited address, which the mail has proven, joins the team and signs in. */
export function JoinForm({ email, token, join }: JoinFormProps) {
  const { run, isBusy, refusal } = useAction({ quiet: true, words: { password: 'The password' } })
  const [problems, setProblems] = useState<FormProblem[]>([])

  const submit = (event: FormEvent<HTMLFormElement>) => {
    event.preventDefault()
    if (isBusy) return
    const data = new FormData(event.currentTarget)
    const name = String(data.get('name') ?? '').trim()
    const password = String(data.get('password') ?? '')
    const found: FormProblem[] = []
    const wrongName = nameProblem(name)
    const wrongPassword = newPasswordProblem(password)
    if (wrongName) found.push({ field: 'name', text: wrongName })
    if (wrongPassword) found.push({ field: 'password', text: wrongPassword })
    setProblems(found)
    if (found.length > 0) return
    run(
      () => join({ token, name, password }),
      async ({ team }) => {
        const books = `/${team}/books`
        const isIn = await authClient.signIn.email({ email, password }).then(
          ({ error }) => error === null,
          () => false,
        )
        // The account is made in any case: where signing in failed, the sign-in page goes on from here.
        window.location.assign(isIn ? books : `/sign-in?next=${encodeURIComponent(books)}`)
      },
    )
  }

  const wrong = (field: string) => problems.find((problem) => problem.field === field)?.text
  const summary = refusal ? [{ text: refusal }] : problems
  return (
    <form onSubmit={submit} noValidate className="sheet grid gap-4 p-5 sm:p-6">
      <ErrorSummary problems={summary} title={refusal ? 'No account was made' : undefined} />
      <Field label="E-mail" hint="You sign in with it. The invitation is for this address alone.">
        {(field) => <Input {...field} type="email" autoComplete="username" value={email} readOnly />}
      </Field>
      <Field
        id="name"
        label="Your name"
        hint="As it should stand beside your changes and on tables."
        error={wrong('name')}
      >
        {(field) => <Input {...field} name="name" autoComplete="name" />}
      </Field>
      <NewPasswordField id="password" label="Password" error={wrong('password')} />
      <Button type="submit" look="main" size="large" busy={isBusy}>
        {isBusy ? 'Making your account' : 'Make an account and join'}
      </Button>
    </form>
  )
}
