import { settleDate } from '../cells/date'
import type { DateOrder, LabQuestion } from '../model'
import type { Ledger, SampleDraft } from '../table/ledger'

/** Decides the order of a table's dates by those that say it themselves; returns how each draft's date reads. */
export function decideDates(
  ledger: Ledger,
  asked: DateOrder | undefined,
): { takenAt: (draft: SampleDraft) => string | undefined; question?: LabQuestion } {
  const [only] = ledger.dateEvidence
  const order = asked ?? (ledger.dateEvidence.size === 1 ? (only as DateOrder) : null)
  const open = new Set<string>()
  for (const { taken } of ledger.drafts)
    if (taken?.date && settleDate(taken.date, order) === undefined) open.add(taken.head || taken.raw)
  const takenAt = ({ taken }: SampleDraft) => taken?.iso ?? (taken?.date && settleDate(taken.date, order))
  if (open.size === 0) return { takenAt }
  return { takenAt, question: { code: 'dates', where: [...open], options: ['dmy', 'mdy'] } }
}
