import type { Metadata } from 'next'
import Link from 'next/link'
import { ResetForm } from '@/components/account/reset-form'
import { ResetRequestForm } from '@/components/account/reset-request-form'
import { SignPage } from '@/components/front/sign-page'

export const metadata: Metadata = { title: 'Choose a new password', robots: { index: false } }

/** Asks for a link by mail; with the token of such a link, asks for the new password. */
export default async function ResetPage({ searchParams }: PageProps<'/reset'>) {
  const { token } = await searchParams
  if (typeof token === 'string')
    return (
      <SignPage title="Choose a new password" intro="You are then signed out everywhere, and sign in with it.">
        <ResetForm token={token} />
      </SignPage>
    )
  return (
    <SignPage
      title="A new password"
      intro={
        <>
          We mail you a link to choose one. You know it after all?{' '}
          <Link href="/sign-in" className="link">
            Sign in
          </Link>
          .
        </>
      }
    >
      <ResetRequestForm />
    </SignPage>
  )
}
