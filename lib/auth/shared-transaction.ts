import { AsyncLocalStorage } from 'node:async_hooks'
import { type Database, db, type Transaction } from '@/db/client'

const current = new AsyncLocalStorage<Transaction>()

/** The transaction that better-auth is in, so that what a hook of ours writes stands or falls with the new account. */
export function authTransaction(): Transaction | undefined {
  return current.getStore()
}

/** The database for better-auth: as it is, but its transactions can be joined. */
export const authDatabase: Database = new Proxy(db, {
  get(target, property, receiver) {
    if (property !== 'transaction') return Reflect.get(target, property, receiver)
    const transaction: Database['transaction'] = (work, options) =>
      target.transaction((tx) => current.run(tx, () => work(tx)), options)
    return transaction
  },
})
