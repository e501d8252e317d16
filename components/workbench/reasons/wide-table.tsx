import type { ReactNode } from 'react'

/** Scrolls sideways on a narrow screen, by keyboard too. */
export function WideTable({ label, children }: { label: string; children: ReactNode }) {
  return (
    // biome-ignore lint/a11y/noNoninteractiveTabindex: what scrolls must be within reach of the arrow keys
    <section className="overflow-x-auto" aria-label={label} tabIndex={0}>
      {children}
    </section>
  )
}
