'use client'

import { useSyncExternalStore } from 'react'

const never = () => () => {}
const options = { dateStyle: 'medium', timeStyle: 'short' } as const

/** A moment as date and time: in UTC as the server writes it, in the reader's own time zone once the browser has it. */
export function Moment({ at }: { at: Date | string }) {
  const date = new Date(at)
  const inBrowser = useSyncExternalStore(
    never,
    () => true,
    () => false,
  )
  const text = inBrowser
    ? date.toLocaleString('en-GB', options)
    : `${date.toLocaleString('en-GB', { ...options, timeZone: 'UTC' })} UTC`
  return <time dateTime={date.toISOString()}>{text}</time>
}
