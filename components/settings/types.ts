import type { TeamSettingsView } from '@/lib/data/settings/get-team-settings'
import type { Result } from '@/lib/errors'

export type Settings = TeamSettingsView
export type SettingsChanges = Partial<Settings>
export type UpdateSettings = (changes: SettingsChanges) => Promise<Result<Settings>>
