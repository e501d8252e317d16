import { db, type Transaction } from '@/db/client'
import type { Result } from '@/lib/errors'

/** Carries a refusal out of a transaction, so that what it had written is rolled back. */
class Refusal extends Error {
  constructor(readonly refused: { ok: false }) {
    super('refused')
  }
}

type Manner = { readOnly?: boolean }

/** Runs `work` in one transaction, which stands only if it answers ok. Reading sees one moment of the database throughout. */
export async function transact<T, E>(
  work: (tx: Transaction) => Promise<Result<T, E>>,
  { readOnly = false }: Manner = {},
): Promise<Result<T, E>> {
  const run = async (tx: Transaction) => {
    const result = await work(tx)
    if (!result.ok) throw new Refusal(result)
    return result
  }
  try {
    return await db.transaction(
      run,
      readOnly ? { isolationLevel: 'repeatable read', accessMode: 'read only' } : undefined,
    )
  } catch (cause) {
    if (cause instanceof Refusal) return cause.refused as Result<T, E>
    throw cause
  }
}
