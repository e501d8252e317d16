import type { Metadata } from 'next'
import { headers } from 'next/headers'
import Link from 'next/link'
import { notFound } from 'next/navigation'
import { MailPage } from '@/components/mail/mail-page'
import { MailTime } from '@/components/mail/mail-time'
import { EmptyState } from '@/components/ui/empty-state'
import { standInFolder, standInMails } from '@/lib/mail/stand-in'

export const metadata: Metadata = { title: 'Mail on this machine' }

/** What the stand-in for a mail server has taken. Local mode only. */
export default async function LocalMailPage() {
  const folder = standInFolder((await headers()).get('host'))
  if (folder === null) notFound()
  const mails = await standInMails(folder)
  return (
    <MailPage title="Mail on this machine" intro="Mail that this copy sends is kept here and goes nowhere else.">
      {mails.length === 0 ? (
        <EmptyState title="No mail yet">
          <p>Invite somebody to a team or ask for a new password: the mail is here a second later.</p>
        </EmptyState>
      ) : (
        <ol className="sheet divide-y divide-hair overflow-hidden">
          {mails.map(({ id, at, to, subject }) => (
            <li key={id}>
              <Link
                href={`/local/mail/${id}`}
                prefetch={false}
                className="grid gap-x-4 px-4 py-2.5 hover:bg-brook-wash sm:grid-cols-[15rem_1fr_auto]"
              >
                <span className="truncate text-ink-2">{to.join(', ')}</span>
                <span className="truncate font-semibold">{subject}</span>
                <MailTime at={at} />
              </Link>
            </li>
          ))}
        </ol>
      )}
    </MailPage>
  )
}
