import { mkdirSync, rmSync } from 'node:fs'
import path from 'node:path'
import type { TestProject } from 'vitest/node'
import { buildWhenStale } from '@/lib/local/build.mjs'
import { findChromium } from '@/lib/local/chromium.mjs'
import { migrate, seed } from '@/lib/local/database.mjs'
import { freePort } from '@/lib/local/ports.mjs'
import { sayTrouble } from '@/lib/local/say.mjs'
import { newSecret } from '@/lib/local/secret.mjs'
import { startServer } from '@/lib/local/server.mjs'
import { openTestDatabase } from '@/lib/local/test-database.mjs'

declare module 'vitest' {
  export interface ProvidedContext {
    /** Where the application under test answers. */
    baseUrl: string
    /** The program that shows it. */
    chromium: string
  }
}

/** The application as it is built for production, on a database of its own with the demo team in it. */
export default async function setUp(project: TestProject): Promise<() => Promise<void>> {
  const chromium = await findChromium()
  await buildWhenStale()
  const database = await openTestDatabase()
  try {
    await migrate(database.url)
    await seed(database.url)
    rmSync('test-results/browser', { recursive: true, force: true }) // pictures of an earlier run
    mkdirSync('test-results', { recursive: true })
    const server = await startServer({
      port: await freePort(),
      databaseUrl: database.url,
      secret: newSecret(),
      logFile: 'test-results/server.log',
      isTest: true,
      mailFolder: emptied('test-results/mail'),
    })
    project.provide('baseUrl', server.address)
    project.provide('chromium', chromium)
    return async () => {
      await server.stop()
      await database.close()
    }
  } catch (cause) {
    sayTrouble(cause)
    await database.close()
    throw cause
  }
}

/** Mail of an earlier run would be found by this one. */
function emptied(folder: string): string {
  rmSync(folder, { recursive: true, force: true })
  return path.resolve(folder)
}
