import type { LabOptions } from './model'

export type AwkwardTable = {
  name: string
  text: string
  options?: LabOptions
  /** Each sample's results in words (see reading.fixture). */
  table?: Record<string, Record<string, string>>
  also?: object
}

export const lines = (...rows: string[]): string => `${rows.join('\n')}\n`
export const na = (value: string, kind = 'value') => ({ Na: `${kind} ${value} mg/L` })
