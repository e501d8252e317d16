import { calledBy } from './check'
import { placeName } from './edits/place'
import type { BookRecord, Kind } from './kinds'
import type { Draft, DraftList, LeftOut } from './problem-draft'
import { problemIssues } from './problem-file-issues'
import type { BookState } from './state'

const kindOf: Record<DraftList, Kind> = {
  components: 'component',
  streams: 'stream',
  units: 'unit',
  reactions: 'reaction',
  parameters: 'parameter',
  givens: 'given',
  relations: 'rule',
}

/** An entry of the draft, and why it cannot stay. */
type Blame = { list: DraftList; id: string; what: string }

/**
 * Takes out of a draft, in place, whatever the checks of the problem file refuse, until nothing is refused. Each goes on
 * the list with its reason, and so does what leans on it. Ends: every round takes something away.
 */
export function leaveOutRefused(state: BookState, draft: Draft, leftOut: LeftOut[]): void {
  for (;;) {
    const issues = problemIssues(draft.problem)
    if (issues.length === 0) return
    const blamed = new Map<string, Blame>()
    for (const { path, what } of issues) {
      const blame = blameFor(draft, path, what)
      if (blame && !blamed.has(`${blame.list}:${blame.id}`)) blamed.set(`${blame.list}:${blame.id}`, blame)
    }
    if (blamed.size === 0) {
      const all = issues.map(({ path, what }) => `${path}: ${what}`).join('; ')
      throw new Error(`A book was turned into a problem that its own checks refuse: ${all}`)
    }
    for (const blame of blamed.values()) takeOut(state, draft, leftOut, blame)
  }
}

/** Which entry an issue is about: `givens.3.unit`, `links.T-101.101`. */
function blameFor({ problem, from }: Draft, path: string, what: string): Blame | undefined {
  const [head = '', second] = path.split('.')
  if (head === 'links') {
    const index = problem.units.findIndex(({ id }) => path === `links.${id}` || path.startsWith(`links.${id}.`))
    const id = from.units[index]
    return id === undefined ? undefined : { list: 'units', id, what }
  }
  // Streams stay, as the table shows them; only their choice for fractions can be taken back.
  const list = head in kindOf && head !== 'components' ? (head as DraftList) : undefined
  if (!list || (list === 'streams' && !path.includes('.fractions'))) return undefined
  const id = from[list][Number(second)]
  return id === undefined ? undefined : { list, id, what }
}

function takeOut(state: BookState, draft: Draft, leftOut: LeftOut[], { list, id, what }: Blame): void {
  const { problem, from } = draft
  const index = from[list].indexOf(id)
  if (index < 0) return
  leftOut.push({ id, kind: kindOf[list], what: sentence(state, kindOf[list], id, what) })
  if (list === 'streams') {
    const stream = problem.streams[index]
    if (stream) delete stream.fractions
    return
  }
  const [entry] = problem[list].splice(index, 1)
  from[list].splice(index, 1)
  if (!entry || !('id' in entry)) return
  const takeAlong = <L extends 'units' | 'reactions' | 'relations'>(
    other: L,
    leans: (candidate: Draft['problem'][L][number]) => boolean,
  ): void => {
    const why = `its ${kindOf[list]} ${entry.id} is left out`
    const entries: readonly Draft['problem'][L][number][] = problem[other]
    const ids = entries.flatMap((candidate, at) => (leans(candidate) ? [from[other][at] as string] : []))
    for (const leaning of ids) takeOut(state, draft, leftOut, { list: other, id: leaning, what: why })
  }
  if (list === 'units') {
    problem.links = Object.fromEntries(Object.entries(problem.links).filter(([unit]) => unit !== entry.id))
    takeAlong('reactions', ({ unit }) => unit === entry.id)
    takeAlong('relations', (rule) => 'unit' in rule && rule.unit === entry.id)
  }
  if (list === 'reactions') {
    takeAlong('relations', (rule) => 'reaction' in rule && rule.reaction === entry.id)
    // Balances without a reaction that takes place would give values that are wrong.
    takeAlong('units', ({ id: unitId }) => 'unit' in entry && unitId === entry.unit)
  }
}

function sentence(state: BookState, kind: Kind, id: string, what: string): string {
  const record = (state[kind] as ReadonlyMap<string, BookRecord>).get(id)
  const name = record?.kind === 'given' ? placeName(state, record) : record ? calledBy(record) : kind
  // Keys of the problem file are words to a person: a mole fraction, not a moleFraction.
  const words = what.replace(
    /\b(?:mass|mole|volume|component|dry|element|group)(?:Mass|Mole)?(?:Flow|Fraction|Ratio)\b/g,
    (key) => key.replace(/[A-Z]/g, (letter) => ` ${letter.toLowerCase()}`),
  )
  return `${name[0]?.toUpperCase()}${name.slice(1)}: ${words}.`
}
