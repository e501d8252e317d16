import { desc, eq, sql } from 'drizzle-orm'
import { db } from '@/db/client'
import { mailDelivery } from '@/db/schema/mail'
import { newId } from '@/lib/book/ids'
import type { MailMessage } from '@/lib/mail/message'
import { unseal } from '@/lib/mail/seal'

/** What is queued for an address of a test's own, read as the worker would read it. */

export const newAddress = (): string => `${newId().toLowerCase()}@x.example`

/** The newest first. */
export async function mailsTo(address: string): Promise<MailMessage[]> {
  const rows = await db
    .select()
    .from(mailDelivery)
    .where(eq(mailDelivery.to, address))
    .orderBy(desc(mailDelivery.createdAt))
  return rows.map(({ id, sealed }) => {
    const text = sealed === null ? null : unseal(sealed, id, process.env.BETTER_AUTH_SECRET ?? '')
    if (text === null) throw new Error(`The mail ${id} cannot be read`)
    return JSON.parse(text) as MailMessage
  })
}

export const kindsTo = async (address: string) => (await mailsTo(address)).map(({ kind }) => kind)

/** The token in the link of the newest mail to an address. */
export async function tokenMailedTo(address: string): Promise<string> {
  const [mail] = await mailsTo(address)
  const link = mail && 'path' in mail ? new URL(mail.path, 'http://here.test') : null
  const token = link?.searchParams.get('token')
  if (!token) throw new Error(`No token in ${JSON.stringify(mail)}`)
  return token
}

/** As if an invitation had been sent so many minutes earlier. */
export async function letTimePass(invitationId: string, minutes: number): Promise<void> {
  await db.execute(sql`
    update invitation set sent_at = sent_at - make_interval(mins => ${minutes}),
      expires_at = expires_at - make_interval(mins => ${minutes}) where id = ${invitationId}`)
}
