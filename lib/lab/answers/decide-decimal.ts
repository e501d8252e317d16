import { settleCell } from '../cells/cell'
import type { DecimalSign, LabQuestion } from '../model'
import type { Ledger } from '../table/ledger'

/**
 * Decides a table's decimal sign by its evidence and settles the results that waited for it.
 * Evidence in numbers goes before that of the separator, which only says what a bare field cannot hold.
 * @returns the sign (null: asked), whether the table showed anything of it, and the question.
 */
export function decideDecimal(
  ledger: Ledger,
  asked: DecimalSign | undefined,
): { decimal: DecimalSign | null; shown: boolean; question?: LabQuestion } {
  const { point, comma } = ledger.decimalEvidence
  const shown = ledger.pending.length > 0 || point.size > 0 || comma.size > 0
  const decimal = asked ?? fromEvidence(ledger)
  for (const { result, cell } of ledger.pending) {
    const settled = settleCell(cell, decimal)
    const { unit, basis, ...before } = result
    // The order of keys stays that of every other result.
    for (const key of ['unit', 'basis'] as const) delete result[key]
    Object.assign(result, before, settled, unit !== undefined && { unit }, basis !== undefined && { basis })
  }
  if (decimal !== null) return { decimal, shown }
  const hanging = new Set(ledger.pending.map(({ result }) => result.analyte))
  const rarer = point.size < comma.size ? point : comma
  const where = [...(hanging.size > 0 ? hanging : rarer)]
  return { decimal, shown, question: { code: 'decimal', where, options: ['point', 'comma'] } }
}

function fromEvidence({ decimalEvidence, pending, separator }: Ledger): DecimalSign | null {
  const { point, comma } = decimalEvidence
  if (point.size > 0 && comma.size > 0) return null
  if (point.size > 0) return 'point'
  if (comma.size > 0) return 'comma'
  if (pending.length === 0) return 'point'
  if (separator === ',') return 'point'
  if (separator === ';' && pending.some(({ result }) => result.raw.includes(','))) return 'comma'
  return null
}
