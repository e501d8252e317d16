'use client'

import { Trash2 } from 'lucide-react'
import { IconButton } from '@/components/ui/button'
import { Field } from '@/components/ui/field'
import { Select } from '@/components/ui/select'
import { shiftDecimal } from '@/lib/book/decimal-text'
import { renameTag } from '@/lib/book/edits/fields'
import { removeRules } from '@/lib/book/edits/remove'
import { type RuleInput, updateRule } from '@/lib/book/edits/rules'
import { newId } from '@/lib/book/ids'
import { type RecordOf, ruleKinds } from '@/lib/book/kinds'
import { setRuleLine } from '@/lib/book/rule-text/rules-text'
import { ruleLine } from '@/lib/book/rule-text/write-line'
import { type RulePart, ruleParts } from '@/lib/book/rule-to-problem'
import { plainNumber } from '@/lib/sheet/format'
import { readNumber } from '@/lib/sheet/read-number'
import type { BookView } from '../book-view'
import { CommitInput } from '../commit-input'
import type { Desk } from '../desk'
import { PartSelect } from './part-select'
import { choicesFor, partTitles, ruleSays, ruleTitles } from './rule-words'

type Rule = RecordOf<'rule'>
type RuleLineProps = { view: BookView; desk: Desk; rule: Rule }
const selected: readonly RulePart[] = [
  'unitId',
  'componentId',
  'streamId',
  'otherComponentId',
  'otherStreamId',
  'reactionId',
]

/** One rule as a plain form: what it names, its value, how it is used. */
export function RuleLine({ view, desk, rule }: RuleLineProps) {
  const { state, mayEdit } = view
  const parts = ruleParts[rule.ruleKind]
  const change = (input: Partial<Omit<RuleInput, 'tag'>>) => desk.run(updateRule(state, rule.id, input, newId))
  const problem = view.leftOut.get(rule.id)
  return (
    <li className="grid gap-1.5 px-4 py-2.5">
      <div className="flex flex-wrap items-end gap-2.5">
        <CommitInput
          label="Rule"
          className="w-20 text-xs [&_input]:h-8"
          value={rule.tag}
          disabled={!mayEdit}
          onCommit={(text) => desk.run(renameTag(state, 'rule', rule.id, text, newId))}
        />
        <Field label="Kind" className="w-44 text-xs">
          {(describing) => (
            <Select
              {...describing}
              className="h-8 text-sm"
              value={rule.ruleKind}
              disabled={!mayEdit}
              onChange={(event) => change({ ruleKind: event.target.value as Rule['ruleKind'] })}
            >
              {ruleKinds.map((kind) => (
                <option key={kind} value={kind}>
                  {ruleTitles[kind]}
                </option>
              ))}
            </Select>
          )}
        </Field>
        {selected
          .filter((part) => part in parts)
          .map((part) => (
            <PartSelect
              key={part}
              label={partTitles[part] ?? part}
              value={rule[part as 'unitId']}
              options={choicesFor(view, rule, part)}
              disabled={!mayEdit}
              onChoose={(id) => change({ [part]: id })}
            />
          ))}
        {'value' in parts ? (
          <CommitInput
            label="Value"
            className="w-28 text-xs [&_input]:h-8"
            placeholder="0.55 or 55 %"
            value={valueText(view, rule)}
            disabled={!mayEdit}
            onCommit={(text) => {
              const read = readValue(view, text)
              return typeof read === 'string' ? read : change(read)
            }}
          />
        ) : null}
        {'value' in parts ? (
          <CommitInput
            label="Half-width, ±"
            className="w-24 text-xs [&_input]:h-8"
            placeholder="exact"
            inputMode="decimal"
            value={rule.halfWidth === null ? '' : plainNumber(rule.halfWidth, view.decimal)}
            disabled={!mayEdit}
            onCommit={(text) => {
              const width = readHalfWidth(view, text)
              return typeof width === 'string' ? width : change({ halfWidth: width })
            }}
          />
        ) : null}
        {'text' in parts ? (
          <CommitInput
            label="Formula"
            className="min-w-72 flex-1 text-xs [&_input]:h-8 [&_input]:font-mono"
            value={rule.text ?? ''}
            disabled={!mayEdit}
            onCommit={(text) => change({ text: text.trim() || null })}
          />
        ) : null}
        <Field label="Use" className="w-32 text-xs">
          {(describing) => (
            <Select
              {...describing}
              className="h-8 text-sm"
              value={rule.use}
              disabled={!mayEdit}
              onChange={(event) => change({ use: event.target.value as Rule['use'] })}
            >
              <option value="given">Used</option>
              <option value="check">Check only</option>
              <option value="withdrawn">Withdrawn</option>
            </Select>
          )}
        </Field>
        {mayEdit ? (
          <IconButton
            size="small"
            label={`Remove rule ${rule.tag}`}
            onClick={() => desk.tryRun(removeRules(state, [rule.id], newId))}
          >
            <Trash2 className="size-4" aria-hidden="true" />
          </IconButton>
        ) : null}
      </div>
      <CommitInput
        label="As text"
        className="text-xs [&_input]:h-8 [&_input]:font-mono"
        value={ruleLine(state, rule)}
        disabled={!mayEdit}
        onCommit={(text) => desk.run(setRuleLine(state, rule.id, text, newId))}
      />
      {'streams' in parts ? <StreamChecks view={view} rule={rule} onChange={(streams) => change({ streams })} /> : null}
      <p className={problem ? 'text-sm text-odds-ink' : 'text-sm text-ink-3'}>{problem ?? ruleSays[rule.ruleKind]}</p>
    </li>
  )
}

function StreamChecks({ view, rule, onChange }: { view: BookView; rule: Rule; onChange: (streams: string[]) => void }) {
  const chosen = view.streams.filter(({ id }) => view.state.ruleStream.has(`${rule.id}/${id}`)).map(({ id }) => id)
  return (
    <fieldset disabled={!view.mayEdit} className="flex flex-wrap gap-x-3 gap-y-1 text-sm">
      <legend className="sr-only">Streams of one composition</legend>
      {view.streams.map(({ id, tag }) => (
        <label key={id} className="flex items-center gap-1">
          <input
            type="checkbox"
            checked={chosen.includes(id)}
            onChange={(event) => onChange(event.target.checked ? [...chosen, id] : chosen.filter((one) => one !== id))}
          />
          {tag}
        </label>
      ))}
    </fieldset>
  )
}

function valueText(view: BookView, rule: Rule): string {
  if (rule.parameterId !== null) return view.state.parameter.get(rule.parameterId)?.tag ?? ''
  return rule.value === null ? '' : plainNumber(rule.value, view.decimal)
}

type Typed = { value: number | null; parameterId: string | null; halfWidth: number | null }

/** A number, a percentage, or the name of a parameter; the half-width is half a unit in the last typed digit. */
function readValue(view: BookView, text: string): Typed | string {
  const typed = text.trim()
  if (typed === '') return { value: null, parameterId: null, halfWidth: null }
  for (const parameter of view.state.parameter.values())
    if (parameter.tag.trim() === typed) return { value: null, parameterId: parameter.id, halfWidth: null }
  const number = readNumber(typed, view.decimal)
  if (!number.ok) return `${number.reason} Or type the name of a parameter.`
  const { halfWidth } = number
  if (number.rest === '%')
    return {
      value: shiftDecimal(number.value, -2),
      parameterId: null,
      halfWidth: halfWidth === null ? null : shiftDecimal(halfWidth, -2),
    }
  if (number.rest !== '') return `“${number.rest}” is not understood here: type a number, or a percentage.`
  return { value: number.value, parameterId: null, halfWidth }
}

function readHalfWidth(view: BookView, text: string): number | null | string {
  if (text.trim() === '') return null
  const number = readNumber(text.replace(/^\s*±\s*/, ''), view.decimal)
  if (!number.ok) return number.reason
  if (number.rest !== '' && number.rest !== '%') return 'A half-width is a plain number or a percentage.'
  const width = number.rest === '%' ? shiftDecimal(number.value, -2) : number.value
  return width > 0 ? width : 'A half-width is more than 0: leave it empty where the rule is exact.'
}
