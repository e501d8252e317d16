import { type ClosureLine, closureOf } from '@/lib/balance'
import type { Problem } from '@/lib/balance/problem'
import type { Solution } from '@/lib/balance/solution'
import { formatNumber } from '@/lib/sheet/format'
import type { BookView } from '../book-view'

/** A line of a closure as it is read: numbers as text, null where something that it needs is not known. */
export type ClosureRow = {
  key: string
  name: string
  unit: string
  in: string | null
  out: string | null
  made: string | null
  held: string | null
  difference: string | null
  percent: string | null
  /** Further off than the team allows. */
  isOver: boolean
}

/** Rounding of the machine, not of the plant: nothing smaller counts as a difference, in per cent. */
const DUST = 1e-7

/** What goes in and comes out of the boundary round some units: in total, by component, and by element where formulas are known. */
export function closureRows(
  view: BookView,
  problem: Problem,
  solution: Solution,
  units: readonly string[],
  limit: number,
): ClosureRow[] {
  return closureOf(problem, solution, units).map((line) => rowOf(view, problem, line, limit))
}

/** The totals of every unit and of the whole, each with the line that closes worst. */
export function closureByUnit(
  view: BookView,
  problem: Problem,
  solution: Solution,
  limit: number,
): { units: string[]; title: string; row: ClosureRow; worst: string | null; isOver: boolean }[] {
  const all = problem.units.map(({ id }) => id)
  const sets = [
    ...all.map((id) => ({ units: [id], title: id })),
    ...(all.length > 1 ? [{ units: all, title: 'Whole process' }] : []),
  ]
  return sets.map(({ units, title }) => {
    const lines = closureOf(problem, solution, units)
    const known = lines.filter(({ percent }) => percent !== undefined)
    const worst = known.reduce<ClosureLine | undefined>(
      (most, line) => (!most || Math.abs(line.percent ?? 0) > Math.abs(most.percent ?? 0) ? line : most),
      undefined,
    )
    const total = lines.find(({ kind }) => kind === 'total') ?? emptyLine
    const off = worst && rowOf(view, problem, worst, limit)
    const open = lines.length - known.length
    const worstText =
      off && Math.abs(worst.percent ?? 0) > DUST ? `${off.name} ${off.percent} %` : open > 0 ? null : 'none'
    return { units, title, row: rowOf(view, problem, total, limit), worst: worstText, isOver: off?.isOver ?? false }
  })
}

const emptyLine: ClosureLine = {
  kind: 'total',
  in: undefined,
  out: undefined,
  made: undefined,
  held: 0,
  difference: undefined,
  percent: undefined,
}

function rowOf(view: BookView, problem: Problem, line: ClosureLine, limit: number): ClosureRow {
  const { kind, component, element, percent, difference } = line
  const isDust = percent !== undefined && Math.abs(percent) < DUST
  const say = (value: number | undefined): string | null =>
    value === undefined ? null : formatNumber(value, 'flow', { decimal: view.decimal, digits: view.digits.flow })
  const named = view.components.find(({ tag }) => tag.trim() === component)
  return {
    key: `${kind} ${component ?? element ?? ''}`,
    name: kind === 'total' ? 'Total' : kind === 'element' ? `Element ${element}` : named?.name || (component ?? ''),
    unit: kind === 'element' ? (view.units?.mole.symbol ?? '') : problem.flowUnit,
    in: say(line.in),
    out: say(line.out),
    made: line.made === 0 ? '' : say(line.made),
    held: line.held === 0 ? '' : say(line.held),
    difference: isDust ? '0' : say(difference),
    percent: percent === undefined ? null : isDust ? '0' : formatNumber(percent, 'percent', { decimal: view.decimal }),
    isOver: percent !== undefined && Math.abs(percent) > limit,
  }
}
