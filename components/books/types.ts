import type { Result } from '@/lib/errors'

/** A book as the list shows it. */
export type BookRow = {
  id: string
  name: string
  documentNumber: string
  projectId: string
  projectName: string
  state: 'draft'
  changedAt: Date | string
  changedBy: { id: string; name: string } | null
  summary: { given: number; solvable: number; unknown: number; atOdds: number; degreesOfFreedom: number } | null
  archivedAt: Date | string | null
}

export type ProjectRow = { id: string; name: string }

export type StarterId = 'salt' | 'citrus' | 'black-mass' | 'biogas' | 'whey'
export type NewBook = {
  projectId: string
  name: string
  from: { kind: 'blank'; basis: 'mass' | 'mole'; flowUnit: string } | { kind: 'starter'; starter: StarterId }
}

/** What the list can have done; each is a server action bound to the team. */
export type BooksActions = {
  createBook: (input: NewBook) => Promise<Result<{ id: string }>>
  duplicateBook: (input: { book: string; name: string }) => Promise<Result<{ id: string }>>
  archiveBook: (input: { book: string }) => Promise<Result<unknown>>
  restoreBook: (input: { book: string }) => Promise<Result<unknown>>
  createProject: (input: { name: string }) => Promise<Result<unknown>>
  renameProject: (input: { project: string; name: string }) => Promise<Result<unknown>>
}
