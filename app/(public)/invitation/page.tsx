import type { Metadata } from 'next'
import { headers } from 'next/headers'
import Link from 'next/link'
import { SignPage } from '@/components/front/sign-page'
import { InvitationSheet } from '@/components/members/invitation-sheet'
import { buttonClasses } from '@/components/ui/button'
import { contextFrom } from '@/lib/auth/context'
import { lookInvitation } from '@/lib/data/invitation/look-invitation'
import { acceptInvitation, signUpAndAccept } from './actions'

export const metadata: Metadata = { title: 'Invitation', robots: { index: false } }

/** Where the link in the mail of an invitation leads, with an account or without. */
export default async function InvitationPage({ searchParams }: PageProps<'/invitation'>) {
  const given = (await searchParams).token
  const token = typeof given === 'string' ? given : ''
  const ctx = await contextFrom(await headers())
  const look = await lookInvitation(ctx, { token })
  if (look.ok)
    return (
      <SignPage
        title={`Join ${look.value.team}`}
        intro={`${look.value.inviter} invites you to a team that keeps its stream tables here.`}
      >
        <InvitationSheet look={look.value} token={token} actions={{ acceptInvitation, signUpAndAccept }} />
      </SignPage>
    )
  const [label, href] = ctx.userId === null ? ['Sign in', '/sign-in'] : ['Go to your books', '/home']
  return (
    <SignPage title="This invitation opens nothing" intro={look.error.message}>
      <Link href={href} prefetch={false} className={buttonClasses('main')}>
        {label}
      </Link>
    </SignPage>
  )
}
