import type { Metadata } from 'next'
import { headers } from 'next/headers'
import { VerifyForm } from '@/components/account/verify-form'
import { SignPage } from '@/components/front/sign-page'
import { contextFrom } from '@/lib/auth/context'

export const metadata: Metadata = { title: 'Confirm your address', robots: { index: false } }

/** Where the link of a mail leads that asks whether an address is somebody's own. */
export default async function VerifyPage({ searchParams }: PageProps<'/verify'>) {
  const { token } = await searchParams
  const { userId } = await contextFrom(await headers())
  return (
    <SignPage title="Confirm your address" intro="This takes one press.">
      <VerifyForm token={typeof token === 'string' ? token : ''} isSignedIn={userId !== null} />
    </SignPage>
  )
}
