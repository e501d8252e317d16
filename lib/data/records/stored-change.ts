import type { bookChange } from '@/db/schema/book'
import type { Change } from '@/lib/book/change'
import { changeVersion } from './write-change'

/** A change as it was stored, in today's shape. The place for upgrades: `changeVersion` is 1, and there are none yet. */
export function storedChange({ id, label, body, schemaVersion }: typeof bookChange.$inferSelect): Change {
  if (schemaVersion !== changeVersion)
    throw new Error(`Change ${id} is of version ${schemaVersion}: this program knows up to ${changeVersion}`)
  return { id, label, ...(body as Pick<Change, 'create' | 'update' | 'remove'>) }
}
