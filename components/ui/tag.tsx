import type { ReactNode } from 'react'
import { classNames } from './class-names'

export type TagTone = 'given' | 'solvable' | 'unknown' | 'atOdds' | 'absent' | 'quiet' | 'draft' | 'brook'

const tones: Record<TagTone, string> = {
  given: 'border-given-edge bg-given',
  solvable: 'border-solved-edge border-dotted bg-solved',
  unknown: 'border-unknown-line cell-unknown',
  atOdds: 'border-odds-edge bg-odds',
  absent: 'border-hair-2 bg-transparent text-absent-ink',
  quiet: 'border-hair-2 bg-transparent text-ink-2 font-normal',
  draft: 'border-hair-2 border-dashed bg-transparent text-ink-2 font-normal',
  brook: 'border-brook bg-brook-wash text-brook',
}

/** A short word about the state of something. The tone repeats the word; it never stands for it. */
export function Tag({
  tone = 'quiet',
  className,
  children,
}: {
  tone?: TagTone
  className?: string
  children: ReactNode
}) {
  return (
    <span
      className={classNames(
        'inline-flex items-center gap-1 rounded-md border px-2 py-px text-xs font-semibold whitespace-nowrap',
        tones[tone],
        className,
      )}
    >
      {tone === 'unknown' ? <span className="rounded bg-unknown px-1">{children}</span> : children}
    </span>
  )
}
