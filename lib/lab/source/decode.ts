/** What the first bytes of a file say it is; its name is not asked. */
export type FileKind = 'zip' | 'text' | { refused: string }

const starts: [number[], string][] = [
  [
    [0x25, 0x50, 0x44, 0x46],
    'This is a PDF, not a table. Copy the table out of it, or ask the laboratory for a .csv or .xlsx file.',
  ],
  [
    [0xd0, 0xcf, 0x11, 0xe0],
    'This is an old or a protected workbook. Save it as .xlsx without a password and try again.',
  ],
  [[0x1f, 0x8b], 'This is a compressed file. Unpack it first.'],
  [[0x37, 0x7a, 0xbc, 0xaf], 'This is a compressed file. Unpack it first.'],
  [[0x52, 0x61, 0x72, 0x21], 'This is a compressed file. Unpack it first.'],
  [[0x89, 0x50, 0x4e, 0x47], 'This is a picture, not a table.'],
  [[0xff, 0xd8, 0xff], 'This is a picture, not a table.'],
  [[0x47, 0x49, 0x46, 0x38], 'This is a picture, not a table.'],
]

export function fileKind(bytes: Uint8Array): FileKind {
  for (const [start, refused] of starts) if (start.every((byte, at) => bytes[at] === byte)) return { refused }
  return bytes[0] === 0x50 && bytes[1] === 0x4b && (bytes[2] as number) < 9 ? 'zip' : 'text'
}

/**
 * Text of a file in UTF-8, UTF-16 (with or without a byte-order mark) or, where neither fits, Windows-1252.
 * @returns undefined where it is no text at all.
 */
export function decodeText(bytes: Uint8Array): string | undefined {
  const text = decode(bytes)
  return text === undefined || isBinary(text) ? undefined : text
}

function decode(bytes: Uint8Array): string | undefined {
  if (bytes[0] === 0xff && bytes[1] === 0xfe) return new TextDecoder('utf-16le').decode(bytes)
  if (bytes[0] === 0xfe && bytes[1] === 0xff) return new TextDecoder('utf-16be').decode(bytes)
  const wide = unmarkedWide(bytes)
  if (wide) return new TextDecoder(wide).decode(bytes)
  try {
    return new TextDecoder('utf-8', { fatal: true }).decode(bytes)
  } catch {
    return new TextDecoder('windows-1252').decode(bytes)
  }
}

/** UTF-16 without a mark: every other byte of a table's text is nought, nearly. */
function unmarkedWide(bytes: Uint8Array): 'utf-16le' | 'utf-16be' | undefined {
  const size = Math.min(bytes.length - (bytes.length % 2), 4096)
  if (size < 4) return undefined
  let even = 0
  let odd = 0
  for (let at = 0; at < size; at += 2) {
    if (bytes[at] === 0) even++
    if (bytes[at + 1] === 0) odd++
  }
  const half = size / 2
  if (odd > half * 0.7 && even < half * 0.05) return 'utf-16le'
  if (even > half * 0.7 && odd < half * 0.05) return 'utf-16be'
  return undefined
}

/** Whether a text holds signs that no table has. */
export function isBinary(text: string): boolean {
  // biome-ignore lint/suspicious/noControlCharactersInRegex: these characters are what is looked for
  const odd = /[\u0000-\u0008\u000e-\u001f\u007f-\u0084\u0086-\u009f]/g
  let found = 0
  for (const _ of text.matchAll(odd)) if (++found > 8) return true
  return text.includes('\u0000') || found > text.length * 0.02
}
