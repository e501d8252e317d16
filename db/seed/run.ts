import { pool } from '@/db/client'
import { env } from '@/lib/env'
import { seedDemo } from './seed-demo'

/** The demo accounts have a password that everybody knows: only on one's own machine, or where `--demo` asks for them. */
const isOnThisMachine = ['127.0.0.1', 'localhost', '[::1]'].includes(new URL(env.databaseUrl).hostname)

async function run(): Promise<void> {
  if (!env.isLocal && !isOnThisMachine && !process.argv.includes('--demo'))
    throw new Error('This database is on another machine. To put demo accounts in it all the same, add --demo.')
  console.log(await seedDemo())
}

run()
  .catch((cause: unknown) => {
    console.error(cause)
    process.exitCode = 1
  })
  .finally(() => pool.end())
