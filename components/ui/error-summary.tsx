'use client'

import { useEffect, useRef } from 'react'

export type FormProblem = {
  /** Id of the control it is about; left out: the whole form. */ field?: string
  text: string
}

/** All that is wrong with a form, at its head, each leading to its field. It takes the focus when it appears. */
export function ErrorSummary({ problems, title }: { problems: FormProblem[]; title?: string }) {
  const ref = useRef<HTMLDivElement>(null)
  useEffect(() => {
    if (problems.length > 0) ref.current?.focus()
  }, [problems])
  if (problems.length === 0) return null
  return (
    <div
      ref={ref}
      role="alert"
      tabIndex={-1}
      className="rounded-control border border-odds-edge bg-odds px-3.5 py-2.5 text-ink"
    >
      <p className="font-semibold">{title ?? (problems.length === 1 ? 'One thing to mend' : 'Some things to mend')}</p>
      <ul className="mt-0.5 grid gap-0.5">
        {problems.map((problem) => (
          <li key={`${problem.field ?? ''}${problem.text}`}>
            {problem.field ? (
              <a
                href={`#${problem.field}`}
                className="underline underline-offset-3"
                onClick={(event) => {
                  event.preventDefault()
                  document.getElementById(problem.field ?? '')?.focus()
                }}
              >
                {problem.text}
              </a>
            ) : (
              problem.text
            )}
          </li>
        ))}
      </ul>
    </div>
  )
}
