import { eq } from 'drizzle-orm'
import { db } from '@/db/client'
import { book } from '@/db/schema/book'
import type { Change, FieldUpdate } from '@/lib/book/change'
import { absenceId, givenId, linkId, newId } from '@/lib/book/ids'
import type { BookRecord, FieldValue, Kind, RecordOf } from '@/lib/book/kinds'
import { recordsOf } from '@/lib/book/state'
import { getBook } from '@/lib/data/book/get-book'
import { writeChanges } from '@/lib/data/book/write-changes'
import { loadState } from '@/lib/data/records/load'
import { type Person, value } from './world'

/** Short ways to say records and changes in tests. */
export const component = (tag: string, id = newId()): RecordOf<'component'> => ({
  kind: 'component',
  id,
  tag,
  name: '',
  formula: null,
  molarMass: null,
  position: 1,
})

export const stream = (tag: string, id = newId()): RecordOf<'stream'> => ({
  kind: 'stream',
  id,
  tag,
  name: '',
  phase: null,
  density: null,
  temperature: null,
  pressure: null,
  fractions: 'asTyped',
  differenceComponentId: null,
  cannotMeasure: null,
  note: null,
  position: 1,
})

export const unit = (tag: string, id = newId()): RecordOf<'unit'> => ({
  kind: 'unit',
  id,
  tag,
  name: '',
  unitKind: 'mixer',
  balance: 'components',
  note: null,
  position: 1,
})

export const absence = (streamId: string, componentId: string): RecordOf<'absence'> => ({
  kind: 'absence',
  id: absenceId(streamId, componentId),
  streamId,
  componentId,
})

export const link = (streamId: string, direction: 'in' | 'out', unitId: string): RecordOf<'link'> => ({
  kind: 'link',
  id: linkId(streamId, direction),
  streamId,
  direction,
  unitId,
})

export const flow = (caseId: string, streamId: string, number: number): RecordOf<'given'> => ({
  kind: 'given',
  id: givenId(caseId, streamId, 'flow', null),
  caseId,
  streamId,
  quantity: 'flow',
  componentId: null,
  measureId: null,
  instrument: 'main',
  text: String(number),
  value: number,
  unit: null,
  halfWidth: null,
  sigma: null,
  use: 'given',
  sourceKind: null,
  source: null,
  note: null,
})

export const change = (parts: Partial<Change>): Change => ({
  id: newId(),
  label: 'An edit',
  create: [],
  update: [],
  remove: [],
  ...parts,
})

export const update = (kind: Kind, id: string, fields: Record<string, [FieldValue, FieldValue]>): FieldUpdate => ({
  kind,
  id,
  fields,
})

/** Sends changes and gives back what became of each. */
export async function write(by: Person, bookId: string, ...changes: Change[]) {
  return value(await writeChanges(by, { book: bookId, changes })).results
}

/** Writes changes that have to be taken. */
export async function mustWrite(by: Person, bookId: string, ...changes: Change[]): Promise<void> {
  const refused = (await write(by, bookId, ...changes)).find((result) => !result.ok)
  if (refused) throw new Error(`Not written: ${JSON.stringify(refused)}`)
}

/** The records as a person gets them. */
export const snapshot = async (by: Person, bookId: string) => value(await getBook(by, { book: bookId }))

/** The records as the rows of the database say, past any memory of them. */
export async function rowsOf(bookId: string): Promise<BookRecord[]> {
  const [row] = await db.select().from(book).where(eq(book.id, bookId))
  if (!row) throw new Error('no such book')
  return sorted(recordsOf(await loadState(db, row)))
}

export const sorted = (records: readonly BookRecord[]): BookRecord[] =>
  [...records].sort((a, b) => (`${a.kind} ${a.id}` < `${b.kind} ${b.id}` ? -1 : 1))

export async function baseCase(by: Person, bookId: string): Promise<string> {
  const found = (await snapshot(by, bookId)).records.find((record) => record.kind === 'case')
  if (!found) throw new Error('no case')
  return found.id
}
