import { limits } from '../limits'

type Entry = { name: string; method: number; packed: number; offset: number }

const refuse = (problem: string) => ({ ok: false as const, problems: [problem] })
const DAMAGED = 'This workbook is damaged: its packing cannot be read.'
const TOO_LARGE = 'This workbook unpacks to more than can be read. Save the table alone and try again.'

/**
 * Unpacks a workbook piece by piece without keeping it, and stops where it grows past the limits: what its directory
 * says of sizes is not believed. Counts rows and cells of the sheets on the way.
 */
export async function checkZip(bytes: Uint8Array): Promise<{ ok: true } | { ok: false; problems: string[] }> {
  const entries = readDirectory(bytes)
  if (!entries) return refuse(DAMAGED)
  if (entries.length > limits.entries) return refuse(TOO_LARGE)
  if (!entries.some(({ name }) => name === 'xl/workbook.xml'))
    return refuse('This is a packed file, but no .xlsx workbook.')
  const names = new Set(entries.map(({ name }) => name))
  if (names.size !== entries.length) return refuse(DAMAGED)
  let total = 0
  const counts = { cells: 0, rows: 0 }
  for (const entry of entries) {
    const packed = packedPart(bytes, entry)
    if (!packed || (entry.method !== 0 && entry.method !== 8)) return refuse(DAMAGED)
    const isSheet = /^xl\/worksheets\/[^/]+\.xml$/.test(entry.name)
    const left = limits.unpackedBytes - total
    const size = await unpackedSize(packed, entry.method, left, isSheet ? counts : undefined)
    if (size === undefined) return refuse(DAMAGED)
    total += size
    if (total >= limits.unpackedBytes || counts.cells > limits.workbookCells) return refuse(TOO_LARGE)
    if (counts.rows > limits.rows * 2)
      return refuse(`The workbook has more than ${limits.rows.toLocaleString('en')} rows. Split it.`)
  }
  return { ok: true }
}

/** The entries as the directory at the end lists them; undefined where there is none (zip64 is for larger files). */
function readDirectory(bytes: Uint8Array): Entry[] | undefined {
  const view = new DataView(bytes.buffer, bytes.byteOffset, bytes.byteLength)
  let end = bytes.length - 22
  const lowest = Math.max(0, end - 65_535)
  while (end >= lowest && view.getUint32(end, true) !== 0x06054b50) end--
  if (end < lowest || end < 0) return undefined
  const count = view.getUint16(end + 10, true)
  let at = view.getUint32(end + 16, true)
  const entries: Entry[] = []
  const decoder = new TextDecoder()
  for (let index = 0; index < count; index++) {
    if (at + 46 > bytes.length || view.getUint32(at, true) !== 0x02014b50) return undefined
    const nameLength = view.getUint16(at + 28, true)
    entries.push({
      name: decoder.decode(bytes.subarray(at + 46, at + 46 + nameLength)),
      method: view.getUint16(at + 10, true),
      packed: view.getUint32(at + 20, true),
      offset: view.getUint32(at + 42, true),
    })
    at += 46 + nameLength + view.getUint16(at + 30, true) + view.getUint16(at + 32, true)
  }
  return entries
}

function packedPart(bytes: Uint8Array, { offset, packed }: Entry): Uint8Array<ArrayBuffer> | undefined {
  const view = new DataView(bytes.buffer, bytes.byteOffset, bytes.byteLength)
  if (offset + 30 > bytes.length || view.getUint32(offset, true) !== 0x04034b50) return undefined
  const start = offset + 30 + view.getUint16(offset + 26, true) + view.getUint16(offset + 28, true)
  return start + packed > bytes.length ? undefined : (bytes.subarray(start, start + packed) as Uint8Array<ArrayBuffer>)
}

/** The size when unpacked, up to `most`; undefined where it cannot be unpacked. */
async function unpackedSize(
  packed: Uint8Array<ArrayBuffer>,
  method: number,
  most: number,
  counts: { cells: number; rows: number } | undefined,
): Promise<number | undefined> {
  if (method === 0) {
    if (counts) countTags(packed, counts)
    return packed.length
  }
  const reader = new Blob([packed]).stream().pipeThrough(new DecompressionStream('deflate-raw')).getReader()
  let size = 0
  try {
    for (;;) {
      const { done, value } = await reader.read()
      if (done) return size
      size += value.length
      if (counts) countTags(value, counts)
      if (size >= most || (counts && counts.cells > limits.workbookCells)) {
        await reader.cancel()
        return size
      }
    }
  } catch {
    return undefined
  }
}

/** Counts "<c " and "<row": a tag cut by a piece's end is missed, which a bound can bear. */
function countTags(bytes: Uint8Array, counts: { cells: number; rows: number }): void {
  for (let at = bytes.indexOf(0x3c); at >= 0; at = bytes.indexOf(0x3c, at + 1)) {
    const next = bytes[at + 1]
    if (next === 0x63 && (bytes[at + 2] === 0x20 || bytes[at + 2] === 0x3e || bytes[at + 2] === 0x2f)) counts.cells++
    else if (next === 0x72 && bytes[at + 2] === 0x6f && bytes[at + 3] === 0x77) counts.rows++
  }
}
