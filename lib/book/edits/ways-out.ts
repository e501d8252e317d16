import type { FieldUpdate } from '../change'
import type { RecordOf } from '../kinds'
import type { BookState } from '../state'
import { type Edit, edit, type MakeId, refuse, updateOf } from './draft'
import { placeName } from './place'

export type Use = RecordOf<'given'>['use']
/** A member of a set that clashes, or anything else that the balance uses, keeps as a check or leaves out. */
export type UsedRef = { kind: 'given' | 'rule'; id: string }

const labels: Record<Use, (name: string) => string> = {
  given: (name) => `Use ${name} again`,
  check: (name) => `Keep ${name} as a check only`,
  withdrawn: (name) => `Withdraw ${name}`,
}

/** Withdraws a given or a rule, keeps it as a check only, or takes it back into use: one change, named by what it does. */
export function setUse(state: BookState, { kind, id }: UsedRef, use: Use, makeId: MakeId): Edit {
  const update: FieldUpdate | undefined | null = updateUse(state, kind, id, use)
  if (update === null) return refuse(kind === 'given' ? 'There is no value in this cell any more.' : gone)
  return edit(state, makeId, labels[use](usedName(state, { kind, id })), { update: [update] })
}

const gone = 'This rule is no longer in the book.'

function updateUse(state: BookState, kind: UsedRef['kind'], id: string, use: Use): FieldUpdate | undefined | null {
  if (kind === 'given') {
    const given = state.given.get(id)
    return given ? updateOf(given, { use }) : null
  }
  const rule = state.rule.get(id)
  return rule ? updateOf(rule, { use }) : null
}

/** "total flow of 112", "rule Q1", to stand inside a sentence. */
export function usedName(state: BookState, { kind, id }: UsedRef): string {
  if (kind === 'rule') return `rule ${state.rule.get(id)?.tag ?? id}`
  const given = state.given.get(id)
  if (!given) return 'a value that is gone'
  const name = placeName(state, given)
  return `${name[0]?.toLowerCase() ?? ''}${name.slice(1)}`
}
