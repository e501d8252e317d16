import { afterAll, inject } from 'vitest'

/** Before any test file loads our modules: they read their settings on first use. */
process.env.DATABASE_URL = inject('databaseUrl')
process.env.BETTER_AUTH_SECRET = 'only-for-tests-only-for-tests-only'
process.env.BETTER_AUTH_URL = 'http://127.0.0.1:3000'
process.env.LOG_LEVEL = 'silent'
process.env.TALLYBROOK_TEST = '1'
process.env.TALLYBROOK_LOCAL = '1'

afterAll(async () => {
  const { pool } = await import('@/db/client')
  await pool.end()
})
