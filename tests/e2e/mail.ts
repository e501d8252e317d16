import type { Page } from 'playwright-core'

type StandInMail = { to: string[]; subject: string; text: string; links: string[] }

/** The newest mail to an address whose subject is like that, waited for: mail goes out by the queue. */
export async function mailTo(page: Page, address: string, subject: RegExp): Promise<StandInMail> {
  for (let look = 0; look < 60; look++) {
    const answer = await page.request.get(`/local/mail/messages.json?to=${encodeURIComponent(address)}`)
    const { messages } = (await answer.json()) as { messages: StandInMail[] }
    const found = messages.find((mail) => subject.test(mail.subject))
    if (found) return found
    await page.waitForTimeout(250)
  }
  throw new Error(`No mail like ${subject} came to ${address}`)
}

/** The link to one of our pages in such a mail, as a path with its query. */
export async function linkMailedTo(page: Page, address: string, subject: RegExp, path: string): Promise<string> {
  const { links } = await mailTo(page, address, subject)
  const link = links.map((text) => new URL(text)).find(({ pathname }) => pathname === path)
  if (!link) throw new Error(`No link to ${path} among ${links.join(', ')}`)
  return link.pathname + link.search
}
