'use client'

import Link from 'next/link'
import { type FormEvent, useRef, useState } from 'react'
import { Button } from '@/components/ui/button'
import { ErrorSummary, type FormProblem } from '@/components/ui/error-summary'
import { Field, Input } from '@/components/ui/field'
import { authClient } from '@/lib/auth/client'
import { DemoAccounts, type DemoAccountsProps } from './demo-accounts'
import { PasswordInput } from './password-input'
import { SecondStep } from './second-step'
import { emailProblem, signFault } from './sign-words'

type SignInFormProps = {
  /** A path of this site; see safeNext. */
  next: string
  /** Only on somebody's own machine. */
  demo: Omit<DemoAccountsProps, 'onPick'> | null
}

export function SignInForm({ next, demo }: SignInFormProps) {
  const [problems, setProblems] = useState<FormProblem[]>([])
  const [isBusy, setBusy] = useState(false)
  const [step, setStep] = useState<'password' | 'code'>('password')
  const form = useRef<HTMLFormElement>(null)

  // A whole page load: what a signed-out visitor was shown is not kept in the router's cache.
  const leave = () => window.location.assign(next)

  const signIn = async (email: string, password: string) => {
    if (isBusy) return
    setBusy(true)
    setProblems([])
    try {
      const { data, error } = await authClient.signIn.email({ email, password })
      if (!error && !asksForCode(data)) return leave()
      if (error) setProblems([{ text: signFault(error) }])
      else setStep('code')
    } catch {
      setProblems([{ text: signFault({}) }])
    }
    setBusy(false)
  }

  const submit = (event: FormEvent<HTMLFormElement>) => {
    event.preventDefault()
    const data = new FormData(event.currentTarget)
    const email = String(data.get('email') ?? '').trim()
    const password = String(data.get('password') ?? '')
    const found: FormProblem[] = []
    const wrongEmail = emailProblem(email)
    if (wrongEmail) found.push({ field: 'email', text: wrongEmail })
    if (password === '') found.push({ field: 'password', text: 'Type your password.' })
    if (found.length > 0) setProblems(found)
    else void signIn(email, password)
  }

  const pick = (email: string, password: string) => {
    const set = (name: string, value: string) => {
      const input = form.current?.elements.namedItem(name)
      if (input instanceof HTMLInputElement) input.value = value
    }
    set('email', email)
    set('password', password)
    void signIn(email, password)
  }

  const wrong = (field: string) => problems.find((problem) => problem.field === field)?.text
  if (step === 'code')
    return (
      <SecondStep
        onDone={leave}
        onRestart={(reason) => {
          setProblems(reason === null ? [] : [{ text: reason }])
          setStep('password')
        }}
      />
    )
  return (
    <div className="grid gap-6">
      <form ref={form} onSubmit={submit} noValidate className="sheet grid gap-4 p-5 sm:p-6">
        <ErrorSummary problems={problems} title={problems.some((p) => p.field) ? undefined : 'You are not signed in'} />
        <Field id="email" label="E-mail" error={wrong('email')}>
          {(field) => <Input {...field} name="email" type="email" autoComplete="username" inputMode="email" />}
        </Field>
        <Field id="password" label="Password" error={wrong('password')}>
          {(field) => <PasswordInput {...field} name="password" autoComplete="current-password" />}
        </Field>
        <Button type="submit" look="main" size="large" busy={isBusy}>
          {isBusy ? 'Signing in' : 'Sign in'}
        </Button>
        <Link href="/reset" className="link justify-self-start">
          The password is lost
        </Link>
      </form>
      {demo ? <DemoAccounts {...demo} onPick={pick} /> : null}
    </div>
  )
}

/** The password was right, and the account asks for a second step. */
function asksForCode(data: object | null): boolean {
  return data !== null && 'twoFactorRedirect' in data && data.twoFactorRedirect === true
}
