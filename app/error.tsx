'use client'

import { Button } from '@/components/ui/button'
import { EmptyState } from '@/components/ui/empty-state'

export default function ErrorPage({ error, reset }: { error: Error & { digest?: string }; reset: () => void }) {
  return (
    <main id="main" className="mx-auto max-w-2xl pt-[10vh]">
      <EmptyState
        level={1}
        title="This page could not be shown"
        actions={
          <Button look="main" onClick={reset}>
            Try again
          </Button>
        }
      >
        <p>
          The fault is in the program, not in what you did, and what was kept is still kept. Try again; if it stays,
          tell whoever runs this copy
          {error.digest ? (
            <>
              {' '}
              and give them the code <code className="font-mono text-ink">{error.digest}</code>
            </>
          ) : null}
          .
        </p>
      </EmptyState>
    </main>
  )
}
