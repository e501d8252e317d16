import { eq } from 'drizzle-orm'
import type { Transaction } from '@/db/client'
import { teamSettings } from '@/db/schema/settings'

/** What a team has chosen; see the columns of `team_settings` for units and meaning. */
export type TeamSettings = {
  massFlowUnit: string
  moleFlowUnit: string
  /** 'own': that of each person's browser. */
  decimal: 'own' | 'point' | 'comma'
  /** Significant digits by kind of row; null: as many as the size of the number asks for. */
  flowDigits: number | null
  fractionDigits: number | null
  carriedDigits: number | null
  /** Per cent of what passes through. */
  closureLimit: number
  /** Per cent, of the sum of an analysis. */
  analysisLow: number
  analysisHigh: number
  /** Per cent of the value, one standard deviation. */
  weakLimit: number
  mailDomains: string[]
}

/** What the screens of a book need of them. */
export type BookSettings = Omit<TeamSettings, 'massFlowUnit' | 'moleFlowUnit' | 'mailDomains'>

/** The same as the defaults of the columns; a test holds them together. */
export const defaultSettings: TeamSettings = {
  massFlowUnit: 'kg/h',
  moleFlowUnit: 'kmol/h',
  decimal: 'own',
  flowDigits: null,
  fractionDigits: null,
  carriedDigits: null,
  closureLimit: 0.1,
  analysisLow: 98,
  analysisHigh: 102,
  weakLimit: 10,
  mailDomains: [],
}

export async function settingsOf(tx: Transaction, teamId: string): Promise<TeamSettings> {
  const [row] = await tx.select().from(teamSettings).where(eq(teamSettings.teamId, teamId))
  if (!row) return { ...defaultSettings, mailDomains: [] }
  const { teamId: _, changedAt: __, ...settings } = row
  return settings
}

export function bookSettings(settings: TeamSettings): BookSettings {
  const { massFlowUnit: _, moleFlowUnit: __, mailDomains: ___, ...ofBooks } = settings
  return ofBooks
}
