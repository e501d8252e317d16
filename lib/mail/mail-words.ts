/** A mail before it is laid out. Everything in it is plain text, never markup. */
export type MailWords = {
  subject: string
  /** The first line on the page. */
  heading: string
  paragraphs: string[]
  /** The one thing to do, if there is one: `path` is a path of this site. */
  action?: { label: string; path: string }
  /** Under the rule: what to do if this was not expected. */
  afterword: string[]
}
