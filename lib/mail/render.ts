import { type MailMessage, mailMessage } from './message'
import { onPaper } from './paper'
import { wordsOf } from './wording'

export type Rendered = { subject: string; text: string; html: string }

/**
 * A message as subject, plain text and HTML. Pure. `baseUrl` is the origin that links lead to. Throws for a message that
 * its schema refuses, such as a link to another site: that is a bug of the caller, never something a person typed.
 */
export function render(message: MailMessage, baseUrl: string): Rendered {
  const { action, ...words } = wordsOf(mailMessage.parse(message))
  const home = new URL(baseUrl).origin
  const link = action && { label: action.label, href: new URL(action.path, home).href }
  const subject = oneLine(words.subject)
  return {
    subject,
    text: asText(words.paragraphs, link, words.afterword, home),
    html: onPaper({ ...words, subject, home, ...(link ? { action: link } : {}) }),
  }
}

type Link = { label: string; href: string }

/** The address of the button stands alone on its line, so that no program takes a full stop into it. */
function asText(paragraphs: string[], link: Link | undefined, afterword: string[], home: string): string {
  const pieces = [...paragraphs, ...(link ? [`${link.label}:\n${link.href}`] : []), ...afterword]
  return `${pieces.join('\n\n')}\n\n-- \nTallybrook, ${home}\nAnswers to this address are not read.\n`
}

/** Names have no line ends; this is the last look before a header. */
function oneLine(subject: string): string {
  return subject.replace(/[\p{Cc}\p{Zl}\p{Zp}]+/gu, ' ')
}
