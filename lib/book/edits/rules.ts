import { type RuleId, ruleStreamId, type StreamId } from '../ids'
import type { BookRecord, RecordOf } from '../kinds'
import { type RulePart, ruleParts } from '../rule-to-problem'
import type { BookState } from '../state'
import { type Edit, edit, type MakeId, refuse, updateOf } from './draft'
import { listedIn, nextTag, takenTags } from './tags'

type Parts = Pick<
  RecordOf<'rule'>,
  | 'unitId'
  | 'streamId'
  | 'componentId'
  | 'otherStreamId'
  | 'otherComponentId'
  | 'reactionId'
  | 'value'
  | 'parameterId'
  | 'text'
  | 'halfWidth'
  | 'use'
  | 'note'
>

export type RuleInput = Partial<Parts> & {
  ruleKind: RecordOf<'rule'>['ruleKind']
  tag?: string
  /** sameComposition */
  streams?: readonly StreamId[]
}

const blank: Parts = {
  unitId: null,
  streamId: null,
  componentId: null,
  otherStreamId: null,
  otherComponentId: null,
  reactionId: null,
  value: null,
  parameterId: null,
  text: null,
  halfWidth: null,
  use: 'given',
  note: null,
}

/** A rule, finished or not: an unfinished one waits, marked, and is not used. */
export function addRule(state: BookState, input: RuleInput, makeId: MakeId): Edit {
  const { ruleKind, tag, streams, ...parts } = input
  const last = listedIn(state, 'rule').at(-1)
  const rule: RecordOf<'rule'> = {
    kind: 'rule',
    id: makeId(),
    tag: tag?.trim() || nextTag(takenTags(state, 'rule'), 'rule', last?.tag),
    ruleKind,
    ...blank,
    ...kept(ruleKind, parts),
    position: Math.floor(last?.position ?? 0) + 1,
  }
  const create: BookRecord[] = [rule]
  if (ruleKind === 'sameComposition') for (const id of new Set(streams ?? [])) create.push(ruleStream(rule.id, id))
  return edit(state, makeId, `Add rule ${rule.tag}`, { create })
}

/** Changes a rule. With another kind, the parts that it has no use for are emptied. */
export function updateRule(state: BookState, id: RuleId, input: Partial<Omit<RuleInput, 'tag'>>, makeId: MakeId): Edit {
  const rule = state.rule.get(id)
  if (!rule) return refuse('This rule is no longer in the book.')
  const { streams, ruleKind = rule.ruleKind, ...parts } = input
  const next = kept(ruleKind, { ...pick(rule), ...parts })
  // A number and a parameter are one or the other.
  if (parts.parameterId != null) next.value = null
  else if (parts.value != null) next.parameterId = null
  const wanted = new Set(ruleKind === 'sameComposition' ? (streams ?? streamsOf(state, id)) : [])
  const create: BookRecord[] = []
  const remove: BookRecord[] = []
  for (const streamId of wanted)
    if (!state.ruleStream.has(ruleStreamId(id, streamId))) create.push(ruleStream(id, streamId))
  for (const record of state.ruleStream.values())
    if (record.ruleId === id && !wanted.has(record.streamId)) remove.push(record)
  const update = updateOf(rule, { ruleKind, ...next })
  return edit(state, makeId, `Change rule ${rule.tag}`, { create, update: [update], remove })
}

const streamsOf = (state: BookState, ruleId: string): string[] =>
  [...state.ruleStream.values()].filter((record) => record.ruleId === ruleId).map(({ streamId }) => streamId)

const ruleStream = (ruleId: string, streamId: string): RecordOf<'ruleStream'> => ({
  kind: 'ruleStream',
  id: ruleStreamId(ruleId, streamId),
  ruleId,
  streamId,
})

function pick(rule: RecordOf<'rule'>): Parts {
  return Object.fromEntries(
    (Object.keys(blank) as (keyof Parts)[]).map((field) => [field, rule[field]]),
  ) as unknown as Parts
}

/** Only what this kind of rule uses. */
function kept(ruleKind: RecordOf<'rule'>['ruleKind'], parts: Partial<Parts>): Parts {
  const used = ruleParts[ruleKind]
  const result: Parts = { ...blank, ...parts }
  const names = [
    'unitId',
    'streamId',
    'componentId',
    'otherStreamId',
    'otherComponentId',
    'reactionId',
    'value',
    'text',
  ]
  for (const part of names as Exclude<RulePart, 'streams'>[]) if (!(part in used)) result[part] = null
  if (!('value' in used)) result.parameterId = null
  return result
}
