'use client'

import { type FormEvent, useState } from 'react'
import { Button } from '@/components/ui/button'
import { ErrorSummary, type FormProblem } from '@/components/ui/error-summary'
import { Field, Input } from '@/components/ui/field'
import { authClient } from '@/lib/auth/client'
import { longestPassword, shortestPassword } from '@/lib/auth/password'
import { nameProblem } from '@/lib/auth/person-name'
import { LookInMail } from './look-in-mail'
import { PasswordInput } from './password-input'
import { emailProblem, newPasswordProblem, signFault } from './sign-words'

/** Makes an account. The answer is the same for an address that has one: what it has, its mailbox alone is told. */
export function SignUpForm() {
  const [sentTo, setSentTo] = useState<string | null>(null)
  const [problems, setProblems] = useState<FormProblem[]>([])
  const [isBusy, setBusy] = useState(false)

  const submit = async (event: FormEvent<HTMLFormElement>) => {
    event.preventDefault()
    if (isBusy) return
    const data = new FormData(event.currentTarget)
    const name = String(data.get('name') ?? '').trim()
    const email = String(data.get('email') ?? '').trim()
    const password = String(data.get('password') ?? '')
    const wrongName = nameProblem(name)
    const wrongEmail = emailProblem(email)
    const wrongPassword = newPasswordProblem(password)
    const found: FormProblem[] = []
    if (wrongName) found.push({ field: 'name', text: wrongName })
    if (wrongEmail) found.push({ field: 'email', text: wrongEmail })
    if (wrongPassword) found.push({ field: 'password', text: wrongPassword })
    setProblems(found)
    if (found.length > 0) return
    setBusy(true)
    try {
      const { error } = await authClient.signUp.email({ name, email, password })
      if (!error) setSentTo(email)
      else setProblems([{ text: signFault(error) }])
    } catch {
      setProblems([{ text: signFault({}) }])
    }
    setBusy(false)
  }

  if (sentTo !== null) return <LookInMail email={sentTo} onOther={() => setSentTo(null)} />
  const wrong = (field: string) => problems.find((problem) => problem.field === field)?.text
  return (
    <form onSubmit={submit} noValidate className="sheet grid gap-4 p-5 sm:p-6">
      <ErrorSummary problems={problems} title={problems.some((p) => p.field) ? undefined : 'No account was made'} />
      <Field
        id="name"
        label="Your name"
        hint="As it should stand beside your changes and on tables."
        error={wrong('name')}
      >
        {(field) => <Input {...field} name="name" autoComplete="name" />}
      </Field>
      <Field id="email" label="Work e-mail" error={wrong('email')}>
        {(field) => <Input {...field} name="email" type="email" autoComplete="username" inputMode="email" />}
      </Field>
      <Field
        id="password"
        label="Password"
        hint={`${shortestPassword} characters or more. A few words in a row are easy to remember.`}
        error={wrong('password')}
      >
        {(field) => (
          <PasswordInput {...field} name="password" autoComplete="new-password" maxLength={longestPassword} />
        )}
      </Field>
      <Button type="submit" look="main" size="large" busy={isBusy}>
        {isBusy ? 'Making your account' : 'Make an account'}
      </Button>
    </form>
  )
}
