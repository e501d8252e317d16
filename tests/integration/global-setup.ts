import type { TestProject } from 'vitest/node'
import { migrate } from '@/lib/local/database.mjs'
import { sayTrouble } from '@/lib/local/say.mjs'
import { openTestDatabase } from '@/lib/local/test-database.mjs'

declare module 'vitest' {
  export interface ProvidedContext {
    /** A migrated database of this run's own: `inject('databaseUrl')`. */
    databaseUrl: string
  }
}

export default async function setUp(project: TestProject): Promise<() => Promise<void>> {
  const database = await openTestDatabase()
  try {
    await migrate(database.url)
  } catch (cause) {
    sayTrouble(cause)
    await database.close()
    throw cause
  }
  project.provide('databaseUrl', database.url)
  return database.close
}
