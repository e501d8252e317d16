'use client'

import { Plus } from 'lucide-react'
import type { ReactNode } from 'react'
import { Button } from '@/components/ui/button'
import { Menu, MenuItem } from '@/components/ui/menu'
import { addParameters } from '@/lib/book/edits/add'
import { addReaction } from '@/lib/book/edits/reactions'
import { addRule } from '@/lib/book/edits/rules'
import { newId } from '@/lib/book/ids'
import { ruleKinds } from '@/lib/book/kinds'
import { inOrder } from '@/lib/book/state'
import type { BookView } from '../book-view'
import type { Desk } from '../desk'
import { ParameterLine } from './parameter-line'
import { ReactionLine } from './reaction-line'
import { RuleLine } from './rule-line'
import { ruleTitles } from './rule-words'
import { RulesAsText, type RulesDraft } from './rules-as-text'

type RulesPanelProps = { view: BookView; desk: Desk; draft: RulesDraft; onDraft: (draft: RulesDraft) => void }

/** Relations between streams, reactions, and the parameters that they share. */
export function RulesPanel({ view, desk, draft, onDraft }: RulesPanelProps) {
  const { asText } = draft
  const { state, mayEdit } = view
  const rules = inOrder(state.rule)
  const reactions = inOrder(state.reaction)
  const parameters = inOrder(state.parameter)
  const reactor = view.plant.find(({ unitKind }) => unitKind === 'reactor') ?? view.plant[0]
  return (
    <div>
      <div className="flex flex-wrap gap-2 border-b border-hair px-4 py-2">
        {mayEdit ? (
          <>
            <Menu
              trigger={
                <Button size="small">
                  <Plus className="size-3.5" aria-hidden="true" /> Rule
                </Button>
              }
            >
              {ruleKinds.map((ruleKind) => (
                <MenuItem key={ruleKind} onSelect={() => desk.tryRun(addRule(state, { ruleKind }, newId))}>
                  {ruleTitles[ruleKind]}
                </MenuItem>
              ))}
            </Menu>
            <Button
              size="small"
              disabled={!reactor}
              title={reactor ? undefined : 'Add a unit first: a reaction runs in a unit'}
              onClick={() => reactor && desk.tryRun(addReaction(state, { unitId: reactor.id }, newId))}
            >
              <Plus className="size-3.5" aria-hidden="true" /> Reaction
            </Button>
            <Button size="small" onClick={() => desk.tryRun(addParameters(state, { items: [{}] }, newId))}>
              <Plus className="size-3.5" aria-hidden="true" /> Parameter
            </Button>
          </>
        ) : null}
        <span className="flex-1" />
        <Button
          size="small"
          look="quiet"
          aria-pressed={asText}
          onClick={() => onDraft({ ...draft, asText: !asText })}
          className="aria-pressed:bg-brook-wash aria-pressed:text-ink"
        >
          As text
        </Button>
      </div>
      <List title="Parameters">
        {parameters.map((parameter) => (
          <ParameterLine key={parameter.id} view={view} desk={desk} parameter={parameter} />
        ))}
      </List>
      {asText ? <RulesAsText view={view} desk={desk} draft={draft} onDraft={onDraft} /> : null}
      {!asText && rules.length + reactions.length + parameters.length === 0 ? (
        <p className="px-4 py-3 text-ink-2">
          No rules yet. A rule is what is known besides the balances: how a splitter splits, what a unit recovers, how
          far a reaction goes.
        </p>
      ) : null}
      <List title="Rules">
        {asText ? [] : rules.map((rule) => <RuleLine key={rule.id} view={view} desk={desk} rule={rule} />)}
      </List>
      <List title="Reactions">
        {reactions.map((reaction) => (
          <ReactionLine key={reaction.id} view={view} desk={desk} reaction={reaction} />
        ))}
      </List>
    </div>
  )
}

function List({ title, children }: { title: string; children: ReactNode[] }) {
  if (children.length === 0) return null
  return (
    <ul className="divide-y divide-hair border-b border-hair" aria-label={title}>
      {children}
    </ul>
  )
}
