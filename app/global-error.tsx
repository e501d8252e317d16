'use client'

import './globals.css'

/** Stands in for the whole page when even its frame fails, so it leans on nothing else. */
export default function GlobalError({ error, reset }: { error: Error & { digest?: string }; reset: () => void }) {
  return (
    <html lang="en">
      <body>
        <main id="main" className="mx-auto grid max-w-xl justify-items-start gap-3 px-5 py-[12vh]">
          <title>Tallybrook: a fault</title>
          <h1 className="text-lg">Tallybrook could not start this page</h1>
          <p>The fault is in the program, not in what you did. What was kept is still kept.</p>
          {error.digest ? (
            <p>
              If it stays, tell whoever runs this copy the code <code>{error.digest}</code>.
            </p>
          ) : null}
          <button type="button" onClick={reset} className="h-9 rounded-control border border-edge px-3.5">
            Try again
          </button>
        </main>
      </body>
    </html>
  )
}
