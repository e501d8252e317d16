const format = new Intl.DateTimeFormat('en-GB', { dateStyle: 'medium', timeStyle: 'medium' })

export function MailTime({ at }: { at: string }) {
  return (
    <time dateTime={at} className="text-ink-2 tabular-nums">
      {format.format(new Date(at))}
    </time>
  )
}
