import { columnForm, type LinearForm } from '../measure/measure'
import { ColumnKind, type Model } from '../model'
import type { Pending } from '../pending/pending'
import type { Assembly } from '../rows/assemble'
import { RowStore } from '../rows/row-store'
import { fixedValue, type Knowledge } from '../states/knowledge'
import { openRows } from '../states/open-rows'
import { resolve } from '../states/resolve'
import type { Resolved } from '../states/resolved'
import { freeSpace } from './free-space'
import { isolate, type OneScalar } from './one-scalar'
import { type ScalarRule, scalarRule } from './scalars'
import type { Work } from './work'

/** One way in which the rules can be met: rows with the values of its scalars put in. */
export type Branch = { assembly: Assembly; resolved: Resolved; touches: boolean }

export type Branches = {
  /** Every way with no flow negative; empty where there is none. */
  leaves: Branch[]
  /** Rules whose scalar was found to have several values, or none. */
  several: Set<Pending>
  none: Set<Pending>
}

const MOST_LEAVES = 16
/** A flow is negative below this part of the largest; a stream above the next part of it flows. */
const NEGATIVE = 1e-7
const FLOWS = 1e-10
/** A row that is open by more than this part of its terms cannot be met at all. */
const CLASHES = 1e-5

/**
 * Finds the rules that hang on one scalar, all values of it, and goes on from each: other rules may turn linear then, hang
 * on one scalar, or turn out impossible. A rule of which all values cannot be found for sure is left as it is.
 */
export function findBranches(model: Model, start: Branch, work: Work): Branches {
  const several = new Set<Pending>()
  const none = new Set<Pending>()
  const explore = (branch: Branch, room: number): Branch[] => {
    const { knowledge, left } = branch.resolved
    if (left.length === 0) return [branch]
    const space = freeSpace(knowledge, work)
    if (!space) return [branch]
    const open: OneScalar[] = groupByScalar(left.flatMap((item) => scalarRule(model, knowledge, item) ?? []))
    for (const group of open) {
      const isolated = isolate(model, space, group, work)
      if (isolated === 'open' || isolated === 'unsure') continue
      const items = group.rules.map(({ item }) => item)
      const next = isolated.roots.map((root) => follow(model, branch, items, root, work))
      if (next.includes('unsure')) continue
      const possible = next.filter((its): its is Branch => its !== 'impossible' && its !== 'unsure')
      if (possible.length > room) continue
      const leaves = possible.flatMap((its, k) => explore(its, Math.floor((room - k) / (possible.length - k))))
      if (leaves.length === 0) for (const item of items) none.add(item)
      if (leaves.length > 1) for (const item of items) several.add(item)
      return leaves
    }
    return [branch]
  }
  const leaves = explore(start, MOST_LEAVES)
  return { leaves, several, none: leaves.length === 0 ? none : new Set() }
}

function groupByScalar(rules: readonly ScalarRule[]): OneScalar[] {
  const groups = new Map<string, OneScalar>()
  for (const rule of rules) {
    const [scalar, ...others] = rule.scalars
    if (!scalar || others.length > 0) continue
    const group = groups.get(scalar.key)
    if (!group) groups.set(scalar.key, { scalar, rules: [rule] })
    else {
      group.rules.push(rule)
      // Each rule's range holds; the narrowest is taken.
      if (scalar.range === 'part' || group.scalar.range === 'any') group.scalar = scalar
    }
  }
  return [...groups.values()]
}

/** Goes on with one root, at which the rows say all that `items` do; 'unsure' where it cannot be told whether it is possible. */
function follow(
  model: Model,
  { assembly, resolved, touches }: Branch,
  items: readonly Pending[],
  root: { touches: boolean; rows: { source: number; form: LinearForm }[] },
  work: Work,
): Branch | 'impossible' | 'unsure' {
  if (!work.take(20 * resolved.knowledge.elimination.rows.column.length)) return 'unsure'
  const next: Assembly = {
    ...assembly,
    rows: copyOf(assembly.rows),
    pending: resolved.left.filter((item) => !items.includes(item)),
  }
  for (const { source, form } of root.rows) next.rows.push(source, form.columns, form.coefficients, 0 - form.constant)
  const found = resolve(model, next)
  if (!found.knowledge.generic.value.every(Number.isFinite)) return 'unsure'
  const opening = worstOpening(found.knowledge)
  if (opening > CLASHES) return 'impossible'
  if (opening > 0) return 'unsure'
  if (!isFeasible(model, resolved.knowledge, found.knowledge)) return 'impossible'
  return {
    assembly: next,
    resolved: {
      ...found,
      rounds: [...resolved.rounds, ...found.rounds],
      restsOn: new Map([...resolved.restsOn, ...found.restsOn]),
      blur: new Map([...resolved.blur, ...found.blur]),
    },
    touches: touches || root.touches,
  }
}

/** How far the dependent rows that do not hold are off, as a part of their terms; 0 where all hold. */
function worstOpening(knowledge: Knowledge): number {
  const { rows } = knowledge.elimination
  const { value } = knowledge.generic
  let worst = 0
  for (const i of openRows(knowledge)) {
    let rest = rows.rhs[i] as number
    let terms = Math.abs(rest)
    for (let k = rows.start[i] as number; k < (rows.start[i + 1] as number); k++) {
      const term = (rows.value[k] as number) * (value[rows.column[k] as number] as number)
      rest -= term
      terms += Math.abs(term)
    }
    worst = Math.max(worst, terms === 0 ? 0 : Math.abs(rest) / terms)
  }
  return worst
}

/**
 * False where a flow would be negative in every solution, or where a stream of which the linear rows do not say so would
 * have no flow: an equal composition with nothing is met by anything, and a flow of 0 is never a result of such.
 */
export function isFeasible(model: Model, before: Knowledge, after: Knowledge): boolean {
  let largest = 0
  for (let j = 0; j < model.nColumns; j++)
    if ((model.columnKind[j] as number) <= ColumnKind.total)
      largest = Math.max(largest, Math.abs(after.particular.value[j] as number))
  for (let j = 0; j < model.nColumns; j++) {
    if ((model.columnKind[j] as number) > ColumnKind.otherTotal) continue
    const value = fixedValue(after, columnForm(j))
    if (value === undefined || fixedValue(before, columnForm(j)) !== undefined) continue
    if (value < -NEGATIVE * largest) return false
  }
  return model.problem.streams.every((_, s) => {
    const column = model.totalColumn[s] as number
    if (column < 0 || fixedValue(before, columnForm(column)) !== undefined) return true
    const value = fixedValue(after, columnForm(column))
    return value === undefined || Math.abs(value) > FLOWS * largest
  })
}

export function copyOf(rows: RowStore): RowStore {
  const copy = new RowStore()
  for (const source of rows.sources) copy.sources.push(source)
  for (let i = 0; i < rows.count; i++)
    copy.push(
      rows.source[i] as number,
      rows.column.slice(rows.start[i], rows.start[i + 1]),
      rows.value.slice(rows.start[i], rows.start[i + 1]),
      rows.rhs[i] as number,
      rows.typed[i],
    )
  return copy
}
