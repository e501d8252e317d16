const anyOrigin = 'http://same.invalid'

/**
 * Where to go after signing in: a path of this site with its query, or null. Anything that a browser could read as another
 * site (`//x`, `/\x`, a scheme, control characters) is refused.
 */
export function safeNext(next: unknown): string | null {
  if (typeof next !== 'string' || !next.startsWith('/') || next.length > 2000) return null
  // biome-ignore lint/suspicious/noControlCharactersInRegex: browsers drop tabs and line ends, so "/\t/x" would read as "//x".
  if (/[\u0000-\u001f\u007f\\]/.test(next)) return null
  if (!URL.canParse(next, anyOrigin)) return null
  const url = new URL(next, anyOrigin)
  if (url.origin !== anyOrigin || url.pathname.startsWith('//')) return null
  return `${url.pathname}${url.search}${url.hash}`
}
