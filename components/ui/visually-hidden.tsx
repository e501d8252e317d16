import type { ReactNode } from 'react'

/** Heard, not seen. */
export function VisuallyHidden({ children }: { children: ReactNode }) {
  return <span className="sr-only">{children}</span>
}
