import type { ExplainedHandle } from './use-explained'

/** Says that the workings are on their way, older than the newest edit, or not to be had. */
export function Waiting({ handle: { explained, stale, trouble } }: { handle: ExplainedHandle }) {
  if (trouble) return <p className="px-4 py-3 text-odds-ink">{trouble}</p>
  if (explained && !stale) return null
  return (
    <p role="status" className={explained ? 'text-2xs text-ink-2' : 'px-4 py-3 text-ink-2'}>
      {explained ? 'Working out the newest edit …' : 'Working out why …'}
    </p>
  )
}
