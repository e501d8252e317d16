import { eq } from 'drizzle-orm'
import { db, pool } from '@/db/client'
import { mark } from '@/db/schema/mark'
import { demoTeam } from './demo-team'
import { seedBooks } from './seed-books'
import { seedTeam } from './seed-team'

/** Any number that no other program takes for its lock on the same database. */
const seedLock = 7_331_002

/** Makes the demo team once. What people do with it afterwards stays as it is. Gives back what to say. */
export async function seedDemo(): Promise<string> {
  const client = await pool.connect()
  try {
    await client.query('select pg_advisory_lock($1)', [seedLock])
    const [done] = await db.select().from(mark).where(eq(mark.name, 'demo'))
    if (done) return `The demo team ${demoTeam.name} is there.`
    await db.transaction(seedTeam)
    await seedBooks()
    await db.insert(mark).values({ name: 'demo' })
    return `The demo team ${demoTeam.name} has been made: five accounts, five plants.`
  } finally {
    await client.query('select pg_advisory_unlock($1)', [seedLock])
    client.release()
  }
}
