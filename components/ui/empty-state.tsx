import type { ReactNode } from 'react'

type EmptyStateProps = { title: ReactNode; children?: ReactNode; actions?: ReactNode; level?: 1 | 2 | 3 }

/** Says what would be here, and what to do so that something is. */
export function EmptyState({ title, children, actions, level = 2 }: EmptyStateProps) {
  const Heading = `h${level}` as const
  return (
    <div className="grid max-w-2xl justify-items-start gap-2 px-5 py-9 sm:px-8">
      <Heading className="text-lg">{title}</Heading>
      {children ? <div className="grid gap-2 text-ink-2">{children}</div> : null}
      {actions ? <div className="mt-3 flex flex-wrap gap-2">{actions}</div> : null}
    </div>
  )
}
