import type { ReactNode } from 'react'
import { FrontHeader } from '@/components/front/front-header'

/** The frame of the pages that show the mail of a local copy. */
export function MailPage({ title, intro, children }: { title: string; intro: ReactNode; children: ReactNode }) {
  return (
    <>
      <FrontHeader isSignedIn={false} bare />
      <main id="main" className="mx-auto w-full max-w-[60rem] px-5 pt-4 pb-16">
        <h1 className="text-[1.75rem] leading-tight">{title}</h1>
        <p className="mt-1.5 mb-5 text-ink-2">{intro}</p>
        {children}
      </main>
    </>
  )
}
