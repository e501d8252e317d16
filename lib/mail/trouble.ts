/** Why a mail did not go out: as a sentence for the delivery log, and whether trying again is of any use. */
export type MailTrouble = { sentence: string; isFinal: boolean }

/** What nodemailer puts on its errors. */
type SmtpError = { code?: unknown; responseCode?: unknown; response?: unknown; command?: unknown }

/**
 * Reads an error of the transport. The server's own words are left out: some quote the message, and the log outlives
 * the links in it. Only a refusal of the address or of the message itself is final; the rest can be mended meanwhile.
 */
export function troubleOf(cause: unknown): MailTrouble {
  const { code, responseCode, response, command } = (cause ?? {}) as SmtpError
  const answered = typeof responseCode === 'number' ? responseCode : undefined
  const numbers = answered === undefined ? '' : ` (${[answered, enhancedCode(response)].filter(Boolean).join(' ')})`
  const isRefused = answered !== undefined && answered >= 500

  if (code === 'EAUTH') return later(`The mail server did not accept the name or password in SMTP_URL${numbers}.`)
  if (isRefused && command === 'RCPT TO')
    return final(`The mail server refused the address${numbers}. It may be mistyped or no longer in use.`)
  if (isRefused && command === 'DATA') return final(`The mail server refused the message${numbers}.`)
  if (isRefused && command === 'MAIL FROM') return later(`The mail server refused the sender in MAIL_FROM${numbers}.`)
  if (answered !== undefined) return later(`The mail server asked to try again later${numbers}.`)
  if (code === 'ETLS') return later('The line to the mail server could not be made secure (TLS).')
  if (code === 'EDNS') return later('The name of the mail server in SMTP_URL is not known.')
  if (code === 'ETIMEDOUT') return later('The mail server did not answer in time.')
  return later('The mail server could not be reached.')
}

const later = (sentence: string): MailTrouble => ({ sentence, isFinal: false })
const final = (sentence: string): MailTrouble => ({ sentence, isFinal: true })

/** "550 5.1.1 No such user" -> "5.1.1": digits only, so nothing else can slip into the log. */
function enhancedCode(response: unknown): string | undefined {
  return typeof response === 'string' ? /^\d{3}[ -](\d\.\d{1,3}\.\d{1,3})\b/.exec(response)?.[1] : undefined
}
