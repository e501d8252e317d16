'use client'

import { useSyncExternalStore } from 'react'

const minute = 60_000
const steps: [upTo: number, unit: Intl.RelativeTimeFormatUnit, size: number][] = [
  [60 * minute, 'minute', minute],
  [24 * 60 * minute, 'hour', 60 * minute],
  [30 * 24 * 60 * minute, 'day', 24 * 60 * minute],
  [365 * 24 * 60 * minute, 'month', 30 * 24 * 60 * minute],
  [Number.POSITIVE_INFINITY, 'year', 365 * 24 * 60 * minute],
]
const format = new Intl.RelativeTimeFormat('en', { numeric: 'auto' })

/** "just now", "5 minutes ago", "yesterday". */
export function relativeTime(at: Date, now: Date): string {
  const ago = Math.max(0, now.getTime() - at.getTime())
  if (ago < minute) return 'just now'
  for (const [upTo, unit, size] of steps) if (ago < upTo) return format.format(-Math.floor(ago / size), unit)
  return ''
}

const subscribe = (onChange: () => void) => {
  const timer = setInterval(onChange, minute)
  return () => clearInterval(timer)
}
const thisMinute = () => Math.floor(Date.now() / minute)

/** A moment, relative; exact under the pointer, in the reader's own time zone once the browser has taken over. */
export function When({ at }: { at: Date | string }) {
  const date = new Date(at)
  const now = useSyncExternalStore(subscribe, thisMinute, () => null)
  const exact =
    now === null
      ? `${date.toISOString().slice(0, 16).replace('T', ' ')} UTC`
      : date.toLocaleString('en-GB', { dateStyle: 'long', timeStyle: 'short' })
  return (
    <time dateTime={date.toISOString()} title={exact}>
      {now === null ? date.toISOString().slice(0, 10) : relativeTime(date, new Date())}
    </time>
  )
}
