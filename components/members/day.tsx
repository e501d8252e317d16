const format = new Intl.DateTimeFormat('en-GB', { dateStyle: 'long', timeZone: 'UTC' })

/** A day in words. In UTC, so that server and browser write the same one. */
export function Day({ at }: { at: Date | string }) {
  const date = new Date(at)
  return <time dateTime={date.toISOString()}>{format.format(date)}</time>
}
