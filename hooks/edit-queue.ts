import { type DBSchema, type IDBPDatabase, openDB } from 'idb'
import { type Change, changeSchema } from '@/lib/book/change'

/** Unsent edits, kept in the browser so that a reload or a broken line loses none. Keyed by person and book. */
export type EditQueue = {
  load: () => Promise<Change[]>
  add: (change: Change) => Promise<void>
  remove: (id: string) => Promise<void>
}

interface EditsDatabase extends DBSchema {
  edits: {
    key: number
    value: { at?: number; owner: string; id: string; change: unknown }
    indexes: { owner: string; id: string }
  }
}

let database: Promise<IDBPDatabase<EditsDatabase>> | undefined

function open(): Promise<IDBPDatabase<EditsDatabase>> {
  database ??= openDB<EditsDatabase>('tallybrook', 1, {
    upgrade(db) {
      const edits = db.createObjectStore('edits', { keyPath: 'at', autoIncrement: true })
      edits.createIndex('owner', 'owner')
      edits.createIndex('id', 'id')
    },
  })
  return database
}

export function editQueue(userId: string, bookId: string): EditQueue {
  const owner = `${userId}:${bookId}`
  return {
    async load() {
      const db = await open()
      const rows = await db.getAllFromIndex('edits', 'owner', owner)
      return rows.flatMap((row) => {
        const parsed = changeSchema.safeParse(row.change)
        return parsed.success ? [parsed.data] : []
      })
    },
    async add(change) {
      const db = await open()
      await db.add('edits', { owner, id: change.id, change })
    },
    async remove(id) {
      const db = await open()
      const transaction = db.transaction('edits', 'readwrite')
      for (const key of await transaction.store.index('id').getAllKeys(id)) await transaction.store.delete(key)
      await transaction.done
    },
  }
}
