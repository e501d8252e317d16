import type { LabResult, LabSample } from '../model'
import type { SampleDraft } from '../table/ledger'

/** All samples of a file, joined over its rows and tables. */
export type SampleFile = { samples: LabSample[]; groups: Map<string, Group[]> }

/** Samples of one id and stream: the first, and its replicates. `counts`: how many of them have each analyte. */
type Group = { stream?: string; records: LabSample[]; counts: Map<string, number>; blanks: Map<string, number>[] }

export function newSampleFile(): SampleFile {
  return { samples: [], groups: new Map() }
}

/** Results that would be each other's replicates have the same key. */
const keyOf = (result: LabResult): string => `${result.analyte}\u0000${result.as ?? ''}\u0000${result.basis ?? ''}`

/**
 * Files a draft: the same id with other analytes is the same sample; with the same ones it is a replicate of the first.
 * Takes time in proportion to the draft alone, however often an id comes again.
 */
export function fileSample(file: SampleFile, draft: SampleDraft, takenAt: string | undefined): void {
  const group = groupOf(file, draft)
  for (const results of withoutRepeats(draft.results)) fileResults(file, group, draft, takenAt, results)
}

function fileResults(
  file: SampleFile,
  group: Group,
  draft: SampleDraft,
  takenAt: string | undefined,
  results: LabResult[],
): void {
  let index = 0
  for (const result of results)
    if (result.kind !== 'blank') index = Math.max(index, group.counts.get(keyOf(result)) ?? 0)
  const known = group.records[index]
  const record: LabSample = known ?? {
    id: draft.id,
    ...(group.records.length > 0 && { replicateOf: draft.id }),
    ...(draft.stream !== undefined && { stream: draft.stream }),
    ...(takenAt !== undefined && { takenAt }),
    note: '',
    results: [],
  }
  const blanks = group.blanks[index] ?? new Map<string, number>()
  if (!known) {
    group.records.push(record)
    group.blanks.push(blanks)
    file.samples.push(record)
  } else {
    record.stream ??= draft.stream
    record.takenAt ??= takenAt
    if (record.stream === undefined) delete record.stream
    if (record.takenAt === undefined) delete record.takenAt
  }
  addWords(record, draft, takenAt)
  for (const result of results) {
    const key = keyOf(result)
    const blank = blanks.get(key)
    if (result.kind === 'blank') {
      const has = blank !== undefined || (group.counts.get(key) ?? 0) > index
      if (has) continue
      blanks.set(key, record.results.length)
      record.results.push(result)
      continue
    }
    group.counts.set(key, index + 1)
    if (blank === undefined) record.results.push(result)
    else {
      record.results[blank] = result
      blanks.delete(key)
    }
  }
}

function groupOf(file: SampleFile, draft: SampleDraft): Group {
  let groups = file.groups.get(draft.id)
  if (!groups) {
    groups = []
    file.groups.set(draft.id, groups)
  }
  // The same id on another stream is another sample.
  let group = groups.find(({ stream }) => stream === undefined || draft.stream === undefined || stream === draft.stream)
  if (!group) {
    group = { records: [], counts: new Map(), blanks: [] }
    groups.push(group)
  }
  group.stream ??= draft.stream
  return group
}

/** Notes and methods, each once. A date that is asked about stays readable in the note. */
function addWords(record: LabSample, draft: SampleDraft, takenAt: string | undefined): void {
  const notes = [...draft.notes]
  if (draft.taken && takenAt === undefined) notes.push(`${draft.taken.head}: ${draft.taken.raw}`)
  for (const note of notes)
    if (!has(record.note, note)) record.note = record.note === '' ? note : `${record.note}; ${note}`
  for (const method of draft.methods)
    if (record.method === undefined || !has(record.method, method))
      record.method = record.method === undefined ? method : `${record.method}; ${method}`
}

const has = (list: string, text: string): boolean => list === text || list.split('; ').includes(text)

/** One row with an analyte twice in the same unit is two replicates; in two units it is one sample. */
function withoutRepeats(results: LabResult[]): LabResult[][] {
  if (results.length < 2) return [results]
  const lists: LabResult[][] = [[]]
  const seen = new Map<string, number>()
  for (const result of results) {
    const key = `${keyOf(result)}\u0000${result.unit ?? ''}`
    const at = seen.get(key) ?? 0
    seen.set(key, at + 1)
    const list = lists[at] ?? []
    if (!lists[at]) lists.push(list)
    list.push(result)
  }
  return lists
}
