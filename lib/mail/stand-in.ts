import { readdir, readFile } from 'node:fs/promises'
import path from 'node:path'
import { z } from 'zod'
import { env } from '@/lib/env'

/** What the stand-in for a mail server keeps of each mail (lib/local/mail-stand-in.mjs writes it). */
const standInMail = z.object({
  id: z.string(),
  at: z.string(),
  from: z.string(),
  to: z.array(z.string()),
  subject: z.string(),
  messageId: z.string(),
  text: z.string(),
  html: z.string(),
})

export type StandInMail = z.infer<typeof standInMail>

const idShape = /^\d{17}-[0-9a-f]{8}$/
const loopback = /^(127\.0\.0\.1|localhost|\[::1\])(:\d+)?$/i

/**
 * The folder, or null where there is nothing to show: no local copy, no stand-in, or asked for by another name than this
 * machine's own. The last keeps these mails, reset links and all, from whoever gets a browser here to ask in their name.
 */
export function standInFolder(host: string | null): string | null {
  return host !== null && loopback.test(host) ? env.mailFolder : null
}

/** The newest first; with `to`, only those to that address. */
export async function standInMails(folder: string, to?: string): Promise<StandInMail[]> {
  const names = await readdir(folder).catch(() => [])
  const ids = names.filter((name) => name.endsWith('.json')).map((name) => name.slice(0, -'.json'.length))
  const mails = await Promise.all(
    ids
      .sort()
      .reverse()
      .map((id) => readStandInMail(folder, id)),
  )
  const wanted = to?.toLowerCase()
  return mails
    .filter((mail) => mail !== null)
    .filter((mail) => wanted === undefined || mail.to.some((address) => address.toLowerCase() === wanted))
}

/** Null where there is none of this id, or no longer. */
export async function readStandInMail(folder: string, id: string): Promise<StandInMail | null> {
  if (!idShape.test(id)) return null
  const text = await readFile(path.join(folder, `${id}.json`), 'utf8').catch(() => null)
  return text === null ? null : standInMail.parse(JSON.parse(text))
}

/** The addresses in a plain text, in order. */
export function linksIn(text: string): string[] {
  return text.match(/https?:\/\/[^\s<>"]+/g) ?? []
}
