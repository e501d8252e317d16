/** A name as it stands in a line, with the column (from 1) where it begins. */
export type Named = { name: string; column: number }

/** What a line says that cannot be taken: where, and a plain sentence. */
export class Unread extends Error {
  constructor(
    readonly column: number,
    what: string,
  ) {
    super(what)
  }
}

/** Words of the grammar: as a name, each is written in quotes. */
const reserved: ReadonlySet<string> = new Set([
  ...['split', 'recovery', 'conversion', 'extent', 'yield', 'selectivity', 'excess', 'same', 'composition', 'formula'],
  ...['of', 'to', 'in', 'from', 'over', 'by', 'check', 'withdrawn', 'flow', 'part', 'share', 'massShare', 'moleShare'],
])

const PLAIN = /^[\p{L}\p{N}_][\p{L}\p{N}_.+/-]*$/u
const NAME = /[\p{L}\p{N}_][\p{L}\p{N}_.+/-]*/uy
const QUOTED = /"(?:[^"\\]|\\.)*"/y
const NUMBER = /[-+]?(?:\d+\.?\d*|\.\d+)(?:[eE][-+]?\d+)?/y
const BLANKS = /\s*/y

/** A name as the grammar has it: plain where it can be, else in quotes. `asValue`: where a number could stand as well. */
export function writtenName(name: string, asValue = false): string {
  const plain = PLAIN.test(name) && !reserved.has(name) && !(asValue && /^[\d.+-]/.test(name))
  return plain ? name : JSON.stringify(name)
}

/** Reads one line from the left. Every refusal is an `Unread` with its column. */
export class Scan {
  at = 0
  constructor(readonly text: string) {}

  /** The column of what comes next. */
  get column(): number {
    this.take(BLANKS)
    return this.at + 1
  }

  get rest(): string {
    this.take(BLANKS)
    return this.text.slice(this.at)
  }

  private take(pattern: RegExp): string | undefined {
    pattern.lastIndex = this.at
    const found = pattern.exec(this.text)?.[0]
    if (found !== undefined) this.at += found.length
    return found
  }

  /** True when the sign came next, and it was taken. */
  sign(sign: string): boolean {
    if (!this.rest.startsWith(sign)) return false
    this.at += sign.length
    return true
  }

  want(sign: string, after: string): void {
    const { column } = this
    if (!this.sign(sign)) throw new Unread(column, `“${sign}” is wanted here, after ${after}.`)
  }

  /** One of the words, taken whole; undefined where another thing comes next. */
  word<W extends string>(...words: W[]): W | undefined {
    this.take(BLANKS)
    const from = this.at
    const found = this.take(NAME) as W | undefined
    if (found !== undefined && words.includes(found)) return found
    this.at = from
    return undefined
  }

  wantWord(word: string, after: string): void {
    const { column } = this
    if (!this.word(word)) throw new Unread(column, `“${word}” is wanted here, after ${after}.`)
  }

  /** A name, plain or in quotes; null for “?”, which stands for what is not chosen yet. */
  name(what: string): Named | null {
    const { column } = this
    if (this.sign('?')) return null
    const quoted = this.take(QUOTED)
    if (quoted !== undefined) return { name: unquoted(quoted, column), column }
    const plain = this.take(NAME)
    if (plain === undefined) throw new Unread(column, `${what} is wanted here, or “?” where it is not known yet.`)
    return { name: plain, column }
  }

  quoted(): string | undefined {
    const { column } = this
    const quoted = this.take(QUOTED)
    return quoted === undefined ? undefined : unquoted(quoted, column)
  }

  /** A number with a point, with “%” behind it where it is one; undefined where no number comes next. */
  number(): { value: number; percent: boolean; column: number } | undefined {
    const { column } = this
    const text = this.take(NUMBER)
    if (text === undefined) return undefined
    const value = Number(text)
    if (/^,\d/.test(this.text.slice(this.at))) throw new Unread(this.at + 1, 'Write the decimal sign as a point here.')
    if (/^[\p{L}\p{N}_.]/u.test(this.text.slice(this.at)))
      throw new Unread(column, 'This is no number; a name that begins like one stands in quotes.')
    if (!Number.isFinite(value)) throw new Unread(column, 'This number is too large.')
    return { value, percent: this.sign('%'), column }
  }

  end(): void {
    const { column } = this
    if (this.at < this.text.length) throw new Unread(column, `“${this.rest}” is not understood here.`)
  }
}

function unquoted(text: string, column: number): string {
  try {
    return JSON.parse(text) as string
  } catch {
    throw new Unread(column, 'What stands in quotes cannot be read: write \\" for a quote and \\\\ for a backslash.')
  }
}
