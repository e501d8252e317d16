'use client'

import { type ReactNode, useEffect, useRef } from 'react'

/** What stands where a form was once it has done its work. It takes the focus, so that it is heard. */
export function DoneNote({ title, children }: { title: string; children: ReactNode }) {
  const heading = useRef<HTMLHeadingElement>(null)
  useEffect(() => heading.current?.focus(), [])
  return (
    <section className="sheet grid justify-items-start gap-3 p-5 sm:p-6">
      <h2 ref={heading} tabIndex={-1} className="text-lg outline-none">
        {title}
      </h2>
      {children}
    </section>
  )
}
