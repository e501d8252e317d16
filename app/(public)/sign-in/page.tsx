import type { Metadata } from 'next'
import { headers } from 'next/headers'
import Link from 'next/link'
import { redirect } from 'next/navigation'
import { SignInForm } from '@/components/front/sign-in-form'
import { SignPage } from '@/components/front/sign-page'
import { contextFrom } from '@/lib/auth/context'
import { demoAccounts } from '@/lib/auth/demo-accounts'
import { safeNext } from '@/lib/http/safe-next'

export const metadata: Metadata = { title: 'Sign in' }

export default async function SignInPage({ searchParams }: PageProps<'/sign-in'>) {
  const next = safeNext((await searchParams).next)
  const { userId } = await contextFrom(await headers())
  if (userId) redirect(next ?? '/home')
  const signUp = next ? `/sign-up?next=${encodeURIComponent(next)}` : '/sign-up'
  return (
    <SignPage
      title="Sign in"
      intro={
        <>
          New here?{' '}
          <Link href={signUp} className="link">
            Make an account
          </Link>
          .
        </>
      }
    >
      <SignInForm next={next ?? '/home'} demo={demoAccounts()} />
    </SignPage>
  )
}
