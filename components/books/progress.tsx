import type { BookRow } from './types'

const plural = (n: number, word: string) => `${n} ${word}${n === 1 ? '' : 's'}`

/** "12 of 90 cells unknown", as the list says it under the bar. */
export function progressText(summary: NonNullable<BookRow['summary']>): string {
  const { unknown, degreesOfFreedom, given, solvable, atOdds } = summary
  if (given + solvable + unknown + atOdds === 0) return 'Nothing in it yet'
  const clash = atOdds > 0 ? `${atOdds} at odds` : ''
  const open =
    unknown > 0
      ? `${unknown} unknown${degreesOfFreedom > 0 ? `, ${plural(degreesOfFreedom, 'degree')} of freedom` : ''}`
      : clash
        ? ''
        : 'Closed'
  return [clash, open].filter(Boolean).join('; ')
}

/** How far a book is: given, solvable now and still unknown by share, and the same in words. */
export function Progress({ summary }: { summary: BookRow['summary'] }) {
  if (!summary) return <span className="text-sm text-ink-3">Not worked out yet</span>
  const { given, solvable, unknown, atOdds } = summary
  const shares = [
    { className: 'bg-given-edge', cells: given },
    { className: 'bg-solved-edge', cells: solvable },
    { className: 'bg-odds-edge', cells: atOdds },
    { className: 'cell-unknown', cells: unknown },
  ]
  return (
    <div className="grid gap-1">
      <div
        role="img"
        aria-label={`${given} given, ${solvable} solvable now, ${unknown} still unknown, ${atOdds} at odds`}
        className="flex h-1.5 w-full min-w-24 gap-px overflow-hidden rounded-full bg-hair"
      >
        {shares
          .filter(({ cells }) => cells > 0)
          .map(({ className, cells }) => (
            <span key={className} className={className} style={{ flexGrow: cells }} />
          ))}
      </div>
      <span className="text-sm text-ink-2 tabular-nums">{progressText(summary)}</span>
    </div>
  )
}
