import { fromProblem } from '@/lib/book/from-problem'
import { newId } from '@/lib/book/ids'
import type { BookRecord, RecordOf } from '@/lib/book/kinds'
import { type StarterName, starters } from '@/lib/book/starters'
import type { NewBook } from './new-book'

/** What a new book can begin from. */
export type BookOrigin =
  | { kind: 'blank'; basis: 'mass' | 'mole'; flowUnit: string }
  | { kind: 'starter'; starter: StarterName }

/** The fields and records that a new book begins with. */
export function contentFrom(origin: BookOrigin, name: string): Omit<NewBook, 'projectId'> {
  if (origin.kind === 'starter') {
    const { name: starterName, description, problem } = starters[origin.starter]
    const records = fromProblem(problem, newId)
    const { basis, flowUnit } = problem
    const fields = { name, description, documentNumber: '', basis, flowUnit }
    return { fields, records: withoutBook(records), label: `New book from the starter ${starterName}` }
  }
  const { basis, flowUnit } = origin
  const baseCase: RecordOf<'case'> = { kind: 'case', id: newId(), name: 'Base case', position: 1 }
  const fields = { name, description: '', documentNumber: '', basis, flowUnit }
  return { fields, records: [baseCase], label: 'New book' }
}

export const withoutBook = (records: readonly BookRecord[]): BookRecord[] =>
  records.filter((record) => record.kind !== 'book')
