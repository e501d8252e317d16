import type { Metadata } from 'next'
import { headers } from 'next/headers'
import Link from 'next/link'
import { redirect } from 'next/navigation'
import { SignPage } from '@/components/front/sign-page'
import { SignUpForm } from '@/components/front/sign-up-form'
import { contextFrom } from '@/lib/auth/context'
import { safeNext } from '@/lib/http/safe-next'

export const metadata: Metadata = { title: 'Make an account' }

export default async function SignUpPage({ searchParams }: PageProps<'/sign-up'>) {
  const next = safeNext((await searchParams).next)
  const { userId } = await contextFrom(await headers())
  if (userId) redirect(next ?? '/home')
  const signIn = next ? `/sign-in?next=${encodeURIComponent(next)}` : '/sign-in'
  return (
    <SignPage
      title="Make an account"
      intro={
        <>
          You get a team of your own with a first project in it. Have an account?{' '}
          <Link href={signIn} className="link">
            Sign in
          </Link>
          .
        </>
      }
    >
      <SignUpForm />
    </SignPage>
  )
}
