import { createHash } from 'node:crypto'
import type { Change } from '@/lib/book/change'

/** Tells two bodies of one change id apart. The order of keys does not matter, the order of lists does. */
export function bodyHash({ label, create, update, remove }: Change): string {
  const canonical = JSON.stringify({ label, create, update, remove }, (_, value: unknown) =>
    value !== null && typeof value === 'object' && !Array.isArray(value)
      ? Object.fromEntries(Object.entries(value).sort(([a], [b]) => (a < b ? -1 : 1)))
      : value,
  )
  return createHash('sha256').update(canonical).digest('hex')
}
