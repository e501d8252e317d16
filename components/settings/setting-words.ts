import type { Settings } from './types'

/** What each setting is called, in the middle of a sentence. */
export const settingNames: Record<keyof Settings, string> = {
  name: 'the name of the team',
  decimal: 'the decimal sign',
  massFlowUnit: 'the flow unit by mass',
  moleFlowUnit: 'the flow unit by moles',
  flowDigits: 'the digits of flows',
  fractionDigits: 'the digits of fractions',
  carriedDigits: 'the digits of carried notes',
  closureLimit: 'the closure limit',
  analysisLow: 'the lower limit of an analysis',
  analysisHigh: 'the upper limit of an analysis',
  weakLimit: 'the weak limit',
  mailDomains: 'the mail domains',
}

export const decimalWords: Record<Settings['decimal'], string> = {
  own: 'as each person’s browser has it',
  point: 'a point: 12.5',
  comma: 'a comma: 12,5',
}

const percentFields: string[] = ['closureLimit', 'analysisLow', 'analysisHigh', 'weakLimit']

function valueWords(field: string, value: unknown): string {
  if (field === 'decimal') return decimalWords[value as Settings['decimal']] ?? String(value)
  if (field === 'mailDomains') return Array.isArray(value) && value.length > 0 ? value.join(', ') : 'any'
  if (value === null) return 'as many as the number asks for'
  if (field === 'name') return `“${String(value)}”`
  return percentFields.includes(field) ? `${String(value)} %` : String(value)
}

/** "changed the closure limit from 0.1 % to 0.5 %; the decimal sign from … to …" */
export function changesSentence(detail: Record<string, unknown>): string {
  const changes = Object.entries(detail).flatMap(([field, change]) => {
    if (typeof change !== 'object' || change === null || !('from' in change) || !('to' in change)) return []
    const name = Object.hasOwn(settingNames, field) ? settingNames[field as keyof Settings] : field
    return [`${name} from ${valueWords(field, change.from)} to ${valueWords(field, change.to)}`]
  })
  return changes.length === 0 ? 'changed the settings of the team' : `changed ${changes.join('; ')}`
}
