const MOST = 20_000

/** The same function, keeping what it gave for texts seen lately: cells and heads of a long table repeat. */
export function remember<T>(read: (text: string) => T): (text: string) => T {
  let known = new Map<string, T>()
  return (text) => {
    if (text.length > 80) return read(text)
    if (known.has(text)) return known.get(text) as T
    if (known.size >= MOST) known = new Map()
    const value = read(text)
    known.set(text, value)
    return value
  }
}
