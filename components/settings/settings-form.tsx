'use client'

import { type FormEvent, useState } from 'react'
import { FlowUnitSelect } from '@/components/books/flow-unit-select'
import { Button } from '@/components/ui/button'
import { ErrorSummary, type FormProblem } from '@/components/ui/error-summary'
import { Field, Input, TextArea } from '@/components/ui/field'
import { Select } from '@/components/ui/select'
import { notify } from '@/components/ui/toast'
import { issueSentence, useAction } from '@/components/ui/use-action'
import type { AppError } from '@/lib/errors'
import { DigitsSelect } from './digits-select'
import { PercentField } from './percent-field'
import { decimalWords, settingNames } from './setting-words'
import { readSettings } from './settings-values'
import type { Settings, UpdateSettings } from './types'

type SettingsFormProps = { settings: Settings; mayChange: boolean; updateSettings: UpdateSettings }

/** What a team has chosen for its books and people. Who may not change it reads it. */
export function SettingsForm({ settings, mayChange, updateSettings }: SettingsFormProps) {
  const { run, isBusy, error } = useAction({ quiet: true })
  const [found, setFound] = useState<FormProblem[]>([])
  const problems = found.length > 0 ? found : error ? problemsOf(error) : []
  const wrong = (field: keyof Settings) => problems.find((problem) => problem.field === field)?.text

  const submit = (event: FormEvent<HTMLFormElement>) => {
    event.preventDefault()
    if (isBusy) return
    const { changes, wrong } = readSettings(new FormData(event.currentTarget), settings)
    setFound(Object.entries(wrong).map(([field, text]) => ({ field, text })))
    if (Object.keys(wrong).length > 0) return
    if (Object.keys(changes).length === 0) return notify('Nothing was changed: all is as it was.')
    run(
      () => updateSettings(changes),
      () => notify('The settings are kept.'),
    )
  }

  return (
    <form onSubmit={submit} noValidate className="grid max-w-3xl gap-6">
      {mayChange ? null : <p className="text-ink-2">Owners of the team change these.</p>}
      <ErrorSummary problems={problems} title={problems.some((p) => p.field) ? undefined : 'Nothing was changed'} />
      <fieldset disabled={!mayChange} className="grid gap-6">
        <Part title="Team">
          <Field id="name" label="Name" error={wrong('name')} className="sm:col-span-2">
            {(field) => (
              <Input {...field} name="name" defaultValue={settings.name} maxLength={200} autoComplete="off" />
            )}
          </Field>
          <Field
            id="mailDomains"
            label="Mail domains"
            hint="Only addresses of these can be invited, such as company.com. Empty: any."
            error={wrong('mailDomains')}
            className="sm:col-span-2"
          >
            {(field) => (
              <TextArea
                {...field}
                name="mailDomains"
                defaultValue={settings.mailDomains.join('\n')}
                rows={2}
                autoCapitalize="none"
                spellCheck={false}
              />
            )}
          </Field>
        </Part>
        <Part title="How numbers are written">
          <Field id="decimal" label="Decimal sign" error={wrong('decimal')} className="sm:col-span-2">
            {(field) => (
              <Select {...field} name="decimal" defaultValue={settings.decimal} wrapperClassName="max-w-80">
                {Object.entries(decimalWords).map(([value, words]) => (
                  <option key={value} value={value}>
                    {words.charAt(0).toUpperCase() + words.slice(1)}
                  </option>
                ))}
              </Select>
            )}
          </Field>
          <Field id="massFlowUnit" label="Flow unit of new books by mass" error={wrong('massFlowUnit')}>
            {(field) => (
              <FlowUnitSelect {...field} basis="mass" name="massFlowUnit" defaultValue={settings.massFlowUnit} />
            )}
          </Field>
          <Field id="moleFlowUnit" label="Flow unit of new books by moles" error={wrong('moleFlowUnit')}>
            {(field) => (
              <FlowUnitSelect {...field} basis="mole" name="moleFlowUnit" defaultValue={settings.moleFlowUnit} />
            )}
          </Field>
          <DigitsSelect field="flowDigits" label="Digits of flows" value={settings.flowDigits} />
          <DigitsSelect field="fractionDigits" label="Digits of fractions" value={settings.fractionDigits} />
          <DigitsSelect
            field="carriedDigits"
            label="Digits of carried notes"
            hint="Kept for you; no screen uses it yet."
            value={settings.carriedDigits}
          />
        </Part>
        <Part title="Limits">
          <PercentField
            field="closureLimit"
            label="A balance closes within"
            hint="Of what passes through, in the exported closure sheet. Common practice: 0.1 to 1 %."
            value={settings.closureLimit}
            error={wrong('closureLimit')}
          />
          <PercentField
            field="weakLimit"
            label="A solved value is weak above"
            hint="Its standard deviation, of the value. No screen uses it yet."
            value={settings.weakLimit}
            error={wrong('weakLimit')}
          />
          <PercentField
            field="analysisLow"
            label="An analysis is complete from"
            hint="Its sum. Common practice: 98 to 102 %. No screen uses it yet."
            value={settings.analysisLow}
            error={wrong('analysisLow')}
          />
          <PercentField
            field="analysisHigh"
            label="An analysis is complete up to"
            hint="Its sum. No screen uses it yet."
            value={settings.analysisHigh}
            error={wrong('analysisHigh')}
          />
        </Part>
      </fieldset>
      {mayChange ? (
        <Button type="submit" look="main" size="large" busy={isBusy} className="justify-self-start">
          Keep the settings
        </Button>
      ) : null}
    </form>
  )
}

function Part({ title, children }: { title: string; children: React.ReactNode }) {
  return (
    <section className="sheet p-5 sm:p-6">
      <h2 className="mb-4 text-lg">{title}</h2>
      <div className="grid gap-4 sm:grid-cols-2 sm:items-end">{children}</div>
    </section>
  )
}

/** A refusal, beside the fields it is about: `changes.mailDomains.0` is about `mailDomains`. */
function problemsOf({ code, message, issues }: AppError): FormProblem[] {
  if (code !== 'badInput' || !issues || issues.length === 0) return [{ text: message }]
  return issues.map((issue) => {
    const field = issue.path.split('.')[1]
    if (field === undefined || !Object.hasOwn(settingNames, field)) return { text: issueSentence(issue) }
    const name = settingNames[field as keyof Settings]
    const subject = field === 'mailDomains' ? 'One of the mail domains' : name.charAt(0).toUpperCase() + name.slice(1)
    return { field, text: issueSentence(issue, { [issue.path]: subject }) }
  })
}
