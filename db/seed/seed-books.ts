import { and, eq } from 'drizzle-orm'
import { db } from '@/db/client'
import { book } from '@/db/schema/book'
import { starters } from '@/lib/book/starters'
import { createBook } from '@/lib/data/book/create-book'
import { writeChanges } from '@/lib/data/book/write-changes'
import { refreshSummary } from '@/lib/data/records/summary'
import type { Result } from '@/lib/errors'
import { type DemoProject, demoProjects, demoTeam } from './demo-team'
import { idOf } from './seed-team'

const engineer = { userId: idOf('engineer'), requestId: 'seed-demo' }

function expectOk<T>(result: Result<T>): T {
  if (result.ok) return result.value
  throw new Error(`The demo books could not be made: ${result.error.message}`, { cause: result.error })
}

/** Makes the books by the same verbs that people's clicks end in. A book left by a run that broke off is not made twice. */
export async function seedBooks(): Promise<void> {
  for (const project of demoProjects) {
    const { name } = starters[project.starter]
    const inProject = and(eq(book.projectId, project.id), eq(book.createdBy, engineer.userId))
    const [there] = await db.select({ id: book.id, number: book.number }).from(book).where(inProject)
    if (there && there.number > 1) continue
    const id = there?.id ?? (await makeBook(project, name))
    await numberDocument(id, project.documentNumber)
    await refreshSummary(id)
  }
}

async function makeBook({ id: projectId, starter }: DemoProject, name: string): Promise<string> {
  const from = { kind: 'starter', starter } as const
  return expectOk(await createBook(engineer, { team: demoTeam.slug, projectId, name, from })).id
}

async function numberDocument(bookId: string, documentNumber: string): Promise<void> {
  const fields: Record<string, [string, string]> = { documentNumber: ['', documentNumber] }
  const update = [{ kind: 'book' as const, id: bookId, fields }]
  const change = {
    id: 'demo-document-number',
    label: `Document number: ${documentNumber}`,
    create: [],
    update,
    remove: [],
  }
  const [written] = expectOk(await writeChanges(engineer, { book: bookId, changes: [change] })).results
  if (!written?.ok) throw new Error(`The document number ${documentNumber} could not be written`, { cause: written })
}
