import { type Edit, type MakeId, refuse } from '../edits/draft'
import { type RuleInput, updateRule } from '../edits/rules'
import { type BookState, inOrder } from '../state'
import { readLine } from './read-line'
import { resolveLine, tagsOf } from './resolve-line'
import { Unread, writtenName } from './scan'
import { ruleLine } from './write-line'

/** What stands in the way of taking a text: line and column from 1, and a sentence. */
export type TextIssue = { line: number; column: number; what: string }
export type TextRule = { tag: string | null; input: RuleInput }

/** All rules of a book, one a line, each with its tag before it. */
export function rulesText(state: BookState): string {
  return inOrder(state.rule)
    .map((rule) => `${writtenName(rule.tag.trim())}: ${ruleLine(state, rule)}`)
    .join('\n')
}

/** Reads every line, empty ones passed over; all that is wrong is told at once. */
export function readRulesText(state: BookState, text: string): { rules: TextRule[]; issues: TextIssue[] } {
  const tags = tagsOf(state)
  const rules: TextRule[] = []
  const issues: TextIssue[] = []
  const firstAt = new Map<string, number>()
  for (const [index, line] of text.split(/\r\n|\r|\n/).entries()) {
    if (line.trim() === '') continue
    try {
      if (line.trimStart().startsWith('#'))
        throw new Unread(line.indexOf('#') + 1, 'A note belongs to a rule: write it behind one.')
      const read = readLine(line)
      const tag = read.tag?.name.trim() ?? null
      const column = read.tag?.column ?? 1
      if (tag !== null && (tag === '' || tag.length > 40))
        throw new Unread(column, 'The tag of a rule has 1 to 40 characters.')
      if (tag !== null && firstAt.has(tag))
        throw new Unread(column, `The tag ${tag} already stands in line ${firstAt.get(tag)}.`)
      if (tag !== null) firstAt.set(tag, index + 1)
      rules.push({ tag, input: resolveLine(state, tags, read) })
    } catch (error) {
      if (!(error instanceof Unread)) throw error
      issues.push({ line: index + 1, column: error.column, what: error.message })
    }
  }
  return { rules, issues }
}

/** One rule from its line; the tag before it, if any, is left aside. */
export function setRuleLine(state: BookState, id: string, text: string, makeId: MakeId): Edit {
  try {
    return updateRule(state, id, resolveLine(state, tagsOf(state), readLine(text.trim())), makeId)
  } catch (error) {
    if (error instanceof Unread) return refuse(`At column ${error.column}: ${error.message}`)
    throw error
  }
}
