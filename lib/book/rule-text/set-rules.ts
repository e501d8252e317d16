import { type Edit, edit, listed, type MakeId, together, updateOf } from '../edits/draft'
import { remove } from '../edits/remove'
import { addRule, updateRule } from '../edits/rules'
import { type BookState, inOrder } from '../state'
import type { TextRule } from './rules-text'

type Step = (state: BookState) => Edit

/**
 * The rules of a text in place of those that stand, as one change: rules are known again by their tags, those whose line is
 * gone are removed, lines without a tag are new rules. They stand in the order of the lines.
 */
export function setRules(state: BookState, rules: readonly TextRule[], makeId: MakeId): Edit {
  const standing = new Map(inOrder(state.rule).map((rule) => [rule.tag.trim(), rule]))
  const wanted = new Set(rules.map(({ tag }) => tag))
  const gone = [...standing].filter(([tag]) => !wanted.has(tag)).map(([, rule]) => rule.id)
  const ids: (string | undefined)[] = rules.map(({ tag }) => (tag === null ? undefined : standing.get(tag)?.id))
  const changing: Step[] = []
  const adding: [tag: string | null, step: Step][] = []
  for (const [index, { tag, input }] of rules.entries()) {
    const id = ids[index]
    if (id === undefined)
      adding.push([
        tag,
        (now) => {
          const made = addRule(now, { ...input, ...(tag === null ? {} : { tag }) }, makeId)
          if (made.ok) ids[index] = made.value.create.find(({ kind }) => kind === 'rule')?.id
          return made
        },
      ])
    else if (isChanged(updateRule(state, id, input, makeId))) changing.push((now) => updateRule(now, id, input, makeId))
  }
  // Named ones first, so that a rule without a tag is never given one that another line asks for.
  adding.sort(([a], [b]) => Number(a === null) - Number(b === null))
  const parts = [
    adding.length > 0 && `${adding.length} added`,
    changing.length > 0 && `${changing.length} changed`,
    gone.length > 0 && `${gone.length} removed`,
  ].filter((part) => part !== false)
  return together(state, makeId, `Rules as text: ${listed(parts) || 'put in order'}`, [
    ...(gone.length > 0 ? [(now: BookState) => remove(now, 'rule', gone, makeId)] : []),
    ...changing,
    ...adding.map(([, step]) => step),
    (now) => inThisOrder(now, ids, makeId),
  ])
}

/** A refused edit counts as one, so that its reason is told. */
const isChanged = (made: Edit): boolean =>
  !made.ok || made.value.create.length + made.value.update.length + made.value.remove.length > 0

function inThisOrder(state: BookState, ids: readonly (string | undefined)[], makeId: MakeId): Edit {
  const rules = ids.map((id) => state.rule.get(id ?? '')).filter((rule) => rule !== undefined)
  const stands = rules.every(
    ({ position }, index) => index === 0 || position > (rules[index - 1]?.position ?? position),
  )
  const update = stands ? [] : rules.map((rule, index) => updateOf(rule, { position: index + 1 }))
  return edit(state, makeId, 'Order of rules', { update })
}
