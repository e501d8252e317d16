import type { LabSample } from '../model'

const WORD =
  /[ _,/-]*\(?(?:dup(?:licate)?|replicate|repl?|wdh|wiederholung|doppelbestimmung|parallele?)\.?[ _#-]*\d*\)?$/i
const LETTER = /[-_/ .]([A-Ha-h])$/
const SLASH = /\/ ?(\d)$/

type Suffix = { base: string; kind: 'word' | 'letter' | 'slash' }

/**
 * Ties samples whose ids differ in a replicate's ending alone ("-A" and "-B", "/1" and "/2", "dup", "rep 2") to their
 * common id, where a sibling exists on the same stream.
 */
export function tieReplicates(samples: LabSample[]): void {
  const families = new Map<string, { sample: LabSample; suffix: Suffix }[]>()
  const byId = new Map<string, LabSample>()
  for (const sample of samples) {
    if (!byId.has(sample.id)) byId.set(sample.id, sample)
    const suffix = suffixOf(sample.id)
    if (!suffix) continue
    const family = families.get(suffix.base) ?? []
    family.push({ sample, suffix })
    families.set(suffix.base, family)
  }
  for (const [base, family] of families) {
    const first = byId.get(base)
    const byStream = new Map<string | undefined, typeof family>()
    for (const member of family)
      byStream.set(member.sample.stream, [...(byStream.get(member.sample.stream) ?? []), member])
    for (const [stream, members] of byStream) {
      const ids = new Set(members.map(({ sample }) => sample.id))
      const sibling = ids.size > 1 || (first !== undefined && first.stream === stream)
      if (!sibling || !isTelling(base, stream, members)) continue
      for (const { sample } of members) setReplicateOf(sample, base)
    }
  }
}

function suffixOf(id: string): Suffix | undefined {
  for (const [kind, ending] of [
    ['word', WORD],
    ['letter', LETTER],
    ['slash', SLASH],
  ] as const) {
    const found = ending.exec(id)
    const base = found ? id.slice(0, found.index).trim() : ''
    if (base !== '') return { base, kind }
  }
  return undefined
}

/** Without a stream only a running number before the ending tells "24-0312-A" from "Tank A". */
function isTelling(base: string, stream: string | undefined, members: { suffix: Suffix }[]): boolean {
  return stream !== undefined || members.every(({ suffix }) => suffix.kind === 'word') || /\d{2}/.test(base)
}

function setReplicateOf(sample: LabSample, base: string): void {
  const { id, replicateOf: _, ...rest } = sample
  const keys = Object.keys(sample) as (keyof LabSample)[]
  for (const key of keys) delete (sample as Partial<LabSample>)[key]
  Object.assign(sample, { id, replicateOf: base }, rest)
}
