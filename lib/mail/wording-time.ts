const format = new Intl.DateTimeFormat('en-GB', {
  day: 'numeric',
  month: 'long',
  year: 'numeric',
  hour: '2-digit',
  minute: '2-digit',
  timeZone: 'UTC',
})

/** "3 March 2027, 14:05 UTC": the mail does not know the reader's clock, so it names its own. */
export function day(moment: string): string {
  const parts = Object.fromEntries(format.formatToParts(new Date(moment)).map(({ type, value }) => [type, value]))
  return `${parts.day} ${parts.month} ${parts.year}, ${parts.hour}:${parts.minute} UTC`
}
