import type { Rule, RuleBody, Value } from '@/lib/balance/problem'
import type { RecordOf } from './kinds'
import { type BookState, inOrder } from './state'

type RuleKind = RecordOf<'rule'>['ruleKind']
export type RulePart =
  | 'unitId'
  | 'streamId'
  | 'componentId'
  | 'otherStreamId'
  | 'otherComponentId'
  | 'reactionId'
  | 'value'
  | 'streams'
  | 'text'

/** What each kind of rule must name, with the words that a person is asked for it in. */
export const ruleParts: { readonly [K in RuleKind]: Partial<Record<RulePart, string>> } = {
  split: { unitId: 'a splitter', streamId: 'an outlet', value: 'a fraction' },
  recovery: { unitId: 'a unit', componentId: 'a component', streamId: 'an outlet', value: 'a fraction' },
  conversion: { unitId: 'a unit', componentId: 'a component', value: 'a fraction' },
  flowRatio: { streamId: 'a stream', otherStreamId: 'the stream compared with', value: 'a ratio' },
  componentRatio: {
    streamId: 'a stream',
    componentId: 'a component',
    otherStreamId: 'the stream compared with',
    otherComponentId: 'the component compared with',
    value: 'a ratio',
  },
  extent: { reactionId: 'a reaction', value: 'an extent' },
  yield: { unitId: 'a unit', componentId: 'a product', otherComponentId: 'what it is made from', value: 'a yield' },
  selectivity: {
    unitId: 'a unit',
    componentId: 'a product',
    otherComponentId: 'the product compared with',
    value: 'a selectivity',
  },
  excess: {
    unitId: 'a unit',
    componentId: 'a component',
    reactionId: 'a reaction',
    otherComponentId: 'the limiting component',
    value: 'an excess',
  },
  sameComposition: { streams: 'at least two streams' },
  formula: { text: 'a formula' },
}

/** The rule as the problem has it, or what it still lacks, as a sentence. */
export function ruleOf(state: BookState, rule: RecordOf<'rule'>): Rule | string {
  const streams =
    rule.ruleKind === 'sameComposition'
      ? inOrder(state.stream).filter(({ id }) => state.ruleStream.has(`${rule.id}/${id}`))
      : []
  const missing: string[] = []
  for (const [part, words] of Object.entries(ruleParts[rule.ruleKind]) as [RulePart, string][])
    if (!hasPart(state, rule, streams.length, part)) missing.push(words)
  if (missing.length > 0) return `Rule ${rule.tag} is unfinished: it needs ${missing.join(', ')}.`
  return {
    id: rule.tag.trim(),
    ...(rule.use !== 'given' && { use: rule.use }),
    ...(rule.halfWidth !== null && { halfWidth: rule.halfWidth }),
    ...(rule.note !== null && { note: rule.note }),
    ...bodyOf(state, rule, streams),
  }
}

function hasPart(state: BookState, rule: RecordOf<'rule'>, streams: number, part: RulePart): boolean {
  switch (part) {
    case 'streams':
      return streams >= 2
    case 'text':
      return rule.text !== null && rule.text.trim() !== ''
    case 'value':
      return rule.value !== null || (rule.parameterId !== null && state.parameter.has(rule.parameterId))
    case 'unitId':
      return rule.unitId !== null && state.unit.has(rule.unitId)
    case 'reactionId':
      return rule.reactionId !== null && state.reaction.has(rule.reactionId)
    case 'streamId':
    case 'otherStreamId':
      return rule[part] !== null && state.stream.has(rule[part])
    case 'componentId':
    case 'otherComponentId':
      return rule[part] !== null && state.component.has(rule[part])
  }
}

/** Called once every part is there. */
function bodyOf(state: BookState, rule: RecordOf<'rule'>, streams: RecordOf<'stream'>[]): RuleBody {
  const tag = (record: { tag: string } | undefined): string => record?.tag.trim() ?? ''
  const unit = tag(state.unit.get(rule.unitId ?? ''))
  const stream = tag(state.stream.get(rule.streamId ?? ''))
  const component = tag(state.component.get(rule.componentId ?? ''))
  const otherStream = tag(state.stream.get(rule.otherStreamId ?? ''))
  const otherComponent = tag(state.component.get(rule.otherComponentId ?? ''))
  const reaction = tag(state.reaction.get(rule.reactionId ?? ''))
  const parameter = rule.parameterId === null ? undefined : state.parameter.get(rule.parameterId)
  const value: Value = parameter ? { parameter: tag(parameter) } : (rule.value ?? 0)
  const kind = rule.ruleKind
  switch (kind) {
    case 'split':
      return { kind, unit, stream, value }
    case 'recovery':
      return { kind, unit, component, stream, value }
    case 'conversion':
      return { kind, unit, component, value }
    case 'flowRatio':
      return { kind, stream, of: otherStream, value }
    case 'componentRatio':
      return { kind, stream, component, of: { stream: otherStream, component: otherComponent }, value }
    case 'extent':
      return { kind, reaction, value }
    case 'yield':
      return { kind, unit, product: component, from: otherComponent, value }
    case 'selectivity':
      return { kind, unit, product: component, over: otherComponent, value }
    case 'excess':
      return { kind, unit, component, reaction, limiting: otherComponent, value }
    case 'sameComposition':
      return { kind, streams: streams.map(tag) }
    case 'formula':
      return { kind, text: rule.text ?? '' }
  }
}
