import type { ReactNode } from 'react'
import { FrontHeader } from './front-header'

/** The frame of the sign-in and sign-up pages. */
export function SignPage({ title, intro, children }: { title: string; intro: ReactNode; children: ReactNode }) {
  return (
    <div className="flex min-h-dvh flex-col">
      <FrontHeader isSignedIn={false} bare />
      <main id="main" className="mx-auto w-full max-w-[440px] px-5 pt-6 pb-16 sm:pt-[9vh]">
        <h1 className="text-[1.75rem] leading-tight">{title}</h1>
        <p className="mt-1.5 mb-5 text-ink-2">{intro}</p>
        {children}
      </main>
    </div>
  )
}
