/** Longest name that common file systems and mail programs take without cutting. */
const longest = 120

/** A file name that every common system takes: no path, no reserved character, not empty. `ending` comes with its dot. */
export function fileName(parts: readonly string[], ending: string): string {
  const words = parts
    .map((part) =>
      part
        .normalize('NFC')
        // biome-ignore lint/suspicious/noControlCharactersInRegex: control characters are what is taken out.
        .replace(/[\u0000-\u001f\u007f<>:"/\\|?*\u200e\u200f\u202a-\u202e\u2066-\u2069]+/g, ' ')
        .replace(/[\ud800-\udbff](?![\udc00-\udfff])|(?<![\ud800-\udbff])[\udc00-\udfff]/g, '')
        .replace(/\s+/g, ' ')
        .replace(/^[. ]+|[. ]+$/g, ''),
    )
    .filter((part) => part !== '')
  const [last = 'book'] = words.slice(-1)
  const before = words.slice(0, -1).join(' ')
  const room = longest - last.length - 3
  const head = [...before].slice(0, Math.max(room, 10)).join('').trim()
  return `${head === '' ? last : `${head} - ${last}`}${ending}`
}

/** Content-Disposition of a download: a plain name for old readers, the real one as RFC 5987 and RFC 6266 have it. */
export function attachment(name: string): string {
  const plain = name
    .normalize('NFKD')
    .replace(/[\u0300-\u036f]/g, '')
    .replace(/[^\x20-\x7e]|["\\%;]/g, '_')
  const encoded = encodeURIComponent(name).replace(/['()*!]/g, (c) => `%${c.charCodeAt(0).toString(16).toUpperCase()}`)
  return `attachment; filename="${plain}"; filename*=UTF-8''${encoded}`
}
