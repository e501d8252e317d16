import type { Model } from '../model'
import type { Pending } from '../pending/pending'
import type { Assembly } from '../rows/assemble'
import { CellFlag, type Diagnostic } from '../solution'
import type { CellArrays } from '../states/fill-cells'
import type { Roots } from './find-roots'

/** What is to be said of rules that can be met in several ways or in none, and of values that a search came upon. */
export function rootDiagnostics(model: Model, assembly: Assembly, roots: Roots, { flags }: CellArrays): Diagnostic[] {
  const found: Diagnostic[] = []
  for (const item of distinct(roots.several)) {
    const named = nameOf(model, assembly, item)
    found.push({
      code: 'severalRoots',
      severity: 'warning',
      ...named.at,
      text: `${named.text} can be met in ${roots.branches.length} ways with no flow negative. Cells that differ between them stay unknown, with all their values listed. Give one more value that tells them apart.`,
    })
  }
  for (const item of distinct(roots.none)) {
    const named = nameOf(model, assembly, item)
    found.push({
      code: 'noRoot',
      severity: 'warning',
      ...named.at,
      text: `${named.text} cannot be met together with the other values: whatever is tried, a balance fails or a flow comes out negative. Cells that hang on it stay unknown. Check the values given round it.`,
    })
  }
  if (flags.some((bits) => bits & CellFlag.localOnly))
    found.push({
      code: 'localOnly',
      severity: 'note',
      text: 'Some values were found by a search from several starts, because several splits or ratios are unknown at once. No other solution came up, but none can be excluded. Those cells are marked.',
    })
  if (roots.stopped)
    found.push({
      code: 'rootsStopped',
      severity: 'note',
      text: 'Rules that multiply or divide unknowns leave too much open to be searched through in the time of an edit. Cells that hang on them may stay unknown. Give more values round them.',
    })
  return found
}

/** One item for each rule or splitter. */
const distinct = (items: readonly Pending[]): Pending[] =>
  items.filter((item, k) => items.findIndex(({ source }) => source === item.source) === k)

function nameOf(
  model: Model,
  { rows }: Assembly,
  { source: number }: Pending,
): { text: string; at: { unit?: string; id?: string } } {
  const source = rows.sources[number]
  if (source?.type === 'composition')
    return { text: `The equal composition of the outlets of splitter ${source.unit}`, at: { unit: source.unit } }
  const id = source?.type === 'rule' ? (model.problem.relations?.[source.index]?.id as string) : ''
  return { text: `Rule ${id}`, at: { id } }
}
