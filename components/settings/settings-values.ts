import type { Settings, SettingsChanges } from './types'

/** A number as typed, with a point or a comma; NaN where it is none. */
function numberIn(text: string): number {
  const plain = text.trim().replace(',', '.')
  return /^\d+(\.\d+)?$/.test(plain) ? Number(plain) : Number.NaN
}

const digitFields = ['flowDigits', 'fractionDigits', 'carriedDigits'] as const
const numberFields = ['closureLimit', 'analysisLow', 'analysisHigh', 'weakLimit'] as const
const textFields = ['name', 'massFlowUnit', 'moleFlowUnit', 'decimal'] as const

export type Reading = { changes: SettingsChanges; wrong: Partial<Record<keyof Settings, string>> }

/** What a form changes of the settings: the fields that differ, so that two owners do not undo each other. */
export function readSettings(form: FormData, before: Settings): Reading {
  const typed = (field: string) => String(form.get(field) ?? '').trim()
  const wrong: Reading['wrong'] = {}
  const after: Record<string, unknown> = {}
  for (const field of textFields) after[field] = typed(field)
  for (const field of digitFields) after[field] = typed(field) === '' ? null : Number(typed(field))
  for (const field of numberFields) {
    const value = numberIn(typed(field))
    if (Number.isNaN(value)) wrong[field] = 'Type a number above zero, such as 0.5.'
    after[field] = value
  }
  after.mailDomains = typed('mailDomains')
    .split(/[\s,;]+/)
    .filter((domain) => domain !== '')
  if (after.name === '') wrong.name = 'Type a name for the team.'
  const changed = Object.entries(after).filter(
    ([field, value]) => JSON.stringify(value) !== JSON.stringify(before[field as keyof Settings]),
  )
  return { changes: Object.fromEntries(changed) as SettingsChanges, wrong }
}
