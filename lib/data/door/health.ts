import { sql } from 'drizzle-orm'
import { db } from '@/db/client'

export async function databaseAnswers(): Promise<boolean> {
  try {
    await db.execute(sql`select 1`)
    return true
  } catch {
    return false
  }
}
