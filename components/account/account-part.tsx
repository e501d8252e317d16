import { type ReactNode, useId } from 'react'

/** One matter of the account page, on a sheet of its own. */
export function AccountPart({ title, intro, children }: { title: string; intro?: ReactNode; children: ReactNode }) {
  const id = useId()
  return (
    <section aria-labelledby={id} className="sheet grid gap-4 p-5 sm:p-6">
      <header>
        <h2 id={id} className="text-lg">
          {title}
        </h2>
        {intro ? <p className="mt-0.5 text-ink-2">{intro}</p> : null}
      </header>
      {children}
    </section>
  )
}
