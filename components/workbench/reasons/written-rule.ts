import type { Rule } from '@/lib/balance/problem'
import { ruleLine } from '@/lib/book/rule-text/write-line'
import type { BookView } from '../book-view'

/** The rule as the book writes it. */
export function writtenRule({ state }: BookView, { id }: Pick<Rule, 'id'>): string {
  const rule = [...state.rule.values()].find(({ tag }) => tag.trim() === id)
  return rule ? ruleLine(state, rule) : `rule ${id}`
}
