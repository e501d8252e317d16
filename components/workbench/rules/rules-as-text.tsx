'use client'

import { useId, useRef, useState } from 'react'
import { Button } from '@/components/ui/button'
import { TextArea } from '@/components/ui/field'
import { newId } from '@/lib/book/ids'
import { readRulesText, rulesText, type TextIssue } from '@/lib/book/rule-text/rules-text'
import { setRules } from '@/lib/book/rule-text/set-rules'
import type { BookView } from '../book-view'
import type { Desk } from '../desk'

/** Kept while another panel is open: what was typed and not yet taken, and the text that it was begun from. */
export type RulesDraft = { asText: boolean; typed: { text: string; from: string } | null }

type RulesAsTextProps = { view: BookView; desk: Desk; draft: RulesDraft; onDraft: (draft: RulesDraft) => void }

/** All rules in one text, one a line. It is taken as a whole or not at all, and what is typed stays until it is. */
export function RulesAsText({ view, desk, draft, onDraft }: RulesAsTextProps) {
  const { state, mayEdit } = view
  const standing = rulesText(state)
  const { typed } = draft
  const [issues, setIssues] = useState<TextIssue[]>([])
  const [refused, setRefused] = useState<string | null>(null)
  const area = useRef<HTMLTextAreaElement>(null)
  const id = useId()
  const text = typed?.text ?? standing
  const moved = typed !== null && typed.from !== standing
  const forget = () => {
    onDraft({ ...draft, typed: null })
    setIssues([])
    setRefused(null)
  }
  const apply = () => {
    const read = readRulesText(state, text)
    setIssues(read.issues)
    setRefused(null)
    if (read.issues.length > 0) return
    const reason = desk.run(setRules(state, read.rules, newId))
    if (reason === null) forget()
    else setRefused(reason)
  }
  const goTo = ({ line, column }: TextIssue) => {
    const lines = text.split('\n')
    const at = lines.slice(0, line - 1).reduce((sum, { length }) => sum + length + 1, 0) + column - 1
    area.current?.focus()
    area.current?.setSelectionRange(at, at)
  }
  const wrong = issues.length > 0 || refused !== null
  return (
    <div className="grid gap-2 px-4 py-3">
      <label htmlFor={id} className="font-semibold">
        Rules, one a line
      </label>
      <TextArea
        ref={area}
        id={id}
        rows={Math.min(Math.max(text.split('\n').length + 1, 4), 14)}
        spellCheck={false}
        readOnly={!mayEdit}
        aria-invalid={wrong || undefined}
        aria-describedby={`${id}-issues ${id}-help`}
        className="font-mono text-sm whitespace-pre [tab-size:2]"
        value={text}
        onChange={(event) => onDraft({ ...draft, typed: { text: event.target.value, from: typed?.from ?? standing } })}
        onKeyDown={(event) => {
          if (event.key === 'Enter' && (event.ctrlKey || event.metaKey) && mayEdit) {
            event.preventDefault()
            apply()
          }
        }}
      />
      <div id={`${id}-issues`} role="status">
        {issues.length > 0 ? (
          <ul className="grid gap-1 rounded-control bg-odds px-3 py-2 text-sm">
            {issues.map((issue) => (
              <li key={`${issue.line}:${issue.column}`}>
                <button type="button" className="link" onClick={() => goTo(issue)}>
                  Line {issue.line}, column {issue.column}
                </button>
                : {issue.what}
              </li>
            ))}
          </ul>
        ) : null}
        {refused === null ? null : <p className="rounded-control bg-odds px-3 py-2 text-sm">{refused}</p>}
        {moved ? (
          <p className="rounded-control bg-rail px-3 py-2 text-sm">
            The rules have been changed elsewhere since you began to type. Take the text to put yours in their place, or
            leave it to see theirs.
          </p>
        ) : null}
      </div>
      {mayEdit ? (
        <div className="flex flex-wrap gap-2">
          <Button size="small" look="main" disabled={typed === null} onClick={apply}>
            Take the text
          </Button>
          <Button size="small" disabled={typed === null} onClick={forget}>
            Leave it
          </Button>
        </div>
      ) : null}
      <Help id={`${id}-help`} />
    </div>
  )
}

const examples = [
  'Q1: split of T-101 to 105 = 0.35',
  'recovery of NaCl in C-103 to 107 = 98 % ± 0.5 %',
  'check: flow(105) = 0.4 * flow(103)  # design ratio',
]

function Help({ id }: { id: string }) {
  return (
    <div id={id} className="text-sm text-ink-2">
      <p>For example:</p>
      <ul className="my-1 grid gap-0.5 font-mono text-xs">
        {examples.map((line) => (
          <li key={line}>{line}</li>
        ))}
      </ul>
      <p>
        What stands before the first colon is the tag of the rule; without one it is a new rule. “check:” and
        “withdrawn:” keep it without using it, “±” is its half-width (left out: exact), “#” begins its note, “?” is what
        is not chosen yet. The decimal sign is a point, and a tag with blanks or signs in it stands in quotes.
      </p>
    </div>
  )
}
