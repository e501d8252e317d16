import type { Metadata } from 'next'
import { headers } from 'next/headers'
import Link from 'next/link'
import { notFound } from 'next/navigation'
import { MailFrame } from '@/components/mail/mail-frame'
import { MailPage } from '@/components/mail/mail-page'
import { MailText } from '@/components/mail/mail-text'
import { MailTime } from '@/components/mail/mail-time'
import { readStandInMail, standInFolder } from '@/lib/mail/stand-in'

export const metadata: Metadata = { title: 'Mail on this machine' }

/** One mail that the stand-in has taken: as HTML and as plain text. Local mode only. */
export default async function LocalMessagePage({ params }: PageProps<'/local/mail/[message]'>) {
  const folder = standInFolder((await headers()).get('host'))
  if (folder === null) notFound()
  const mail = await readStandInMail(folder, (await params).message)
  if (mail === null) notFound()
  return (
    <MailPage
      title={mail.subject}
      intro={
        <>
          To {mail.to.join(', ')} from {mail.from}, <MailTime at={mail.at} />.{' '}
          <Link href="/local/mail" className="link">
            All mail
          </Link>
        </>
      }
    >
      <MailFrame html={mail.html} title="The mail as HTML" />
      <section aria-labelledby="plain" className="mt-6">
        <h2 id="plain" className="mb-2 text-md">
          As plain text
        </h2>
        <MailText text={mail.text} />
      </section>
    </MailPage>
  )
}
