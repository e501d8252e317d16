import { leavesOf, parseFormulaText } from '@/lib/balance/formula/parse-formula'
import type { RuleInput } from '../edits/rules'
import { ruleParts } from '../rule-to-problem'
import type { BookState } from '../state'
import type { RuleLine } from './read-line'
import { type Named, Unread } from './scan'

/** Tags to ids, kind by kind; made once for all lines. */
export type Tags = { [K in 'unit' | 'stream' | 'component' | 'reaction' | 'parameter']: ReadonlyMap<string, string> }

export function tagsOf(state: BookState): Tags {
  const of = (records: ReadonlyMap<string, { id: string; tag: string }>) =>
    new Map([...records.values()].map(({ id, tag }) => [tag.trim(), id]))
  return {
    unit: of(state.unit),
    stream: of(state.stream),
    component: of(state.component),
    reaction: of(state.reaction),
    parameter: of(state.parameter),
  }
}

/** The rule that a line stands for, with its names looked up. Throws `Unread` at a name that the book has not. */
export function resolveLine(state: BookState, tags: Tags, line: RuleLine): RuleInput {
  const id = (kind: keyof Tags, named: Named | null): string | null => {
    if (named === null) return null
    const found = tags[kind].get(named.name.trim())
    if (found === undefined) throw new Unread(named.column, `There is no ${kind} “${named.name}”.`)
    return found
  }
  const seen = new Set<string>()
  const streams = line.streams.map((named) => {
    if (seen.has(named.name)) throw new Unread(named.column, `Stream ${named.name} is listed twice.`)
    seen.add(named.name)
    return id('stream', named) as string
  })
  if (line.formulaAt > 0 && line.text !== null) {
    const fault = formulaFault(state, line.text)
    if (fault !== null) throw new Unread(line.formulaAt, fault)
  }
  if ((line.text?.length ?? 0) > 2000) throw new Unread(1, 'A formula has at most 2,000 characters.')
  if ((line.note?.length ?? 0) > 2000) throw new Unread(1, 'A note has at most 2,000 characters.')
  return {
    ruleKind: line.ruleKind,
    use: line.use,
    unitId: id('unit', line.unit),
    streamId: id('stream', line.stream),
    componentId: id('component', line.component),
    otherStreamId: id('stream', line.otherStream),
    otherComponentId: id('component', line.otherComponent),
    reactionId: id('reaction', line.reaction),
    value: line.value?.kind === 'number' ? line.value.value : null,
    parameterId: line.value?.kind === 'parameter' ? id('parameter', line.value.name) : null,
    text: line.text,
    halfWidth: line.halfWidth,
    note: line.note,
    ...('streams' in ruleParts[line.ruleKind] && { streams }),
  }
}

/** Why a formula cannot be calculated in this book, as a sentence; null where it can. */
export function formulaFault(state: BookState, text: string): string | null {
  const parsed = parseFormulaText(text)
  if (!parsed.ok) return `The formula cannot be read: ${parsed.what}.`
  const has = (records: ReadonlyMap<string, { tag: string }>, tag: string) =>
    [...records.values()].some((record) => record.tag.trim() === tag)
  for (const leaf of [...leavesOf(parsed.left), ...leavesOf(parsed.right)]) {
    if (leaf.kind === 'parameter') {
      if (!has(state.parameter, leaf.id)) return `There is no parameter “${leaf.id}”.`
      continue
    }
    if (!has(state.stream, leaf.stream)) return `There is no stream “${leaf.stream}”.`
    if (leaf.component !== undefined && !has(state.component, leaf.component))
      return `There is no component “${leaf.component}”.`
  }
  return null
}
