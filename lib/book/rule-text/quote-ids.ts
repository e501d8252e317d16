const CALL =
  /\b(flow|part|share|massShare|moleShare)\(\s*([^"'(),\s][^"'(),]*?)?\s*(?:(,)\s*([^"'(),\s][^"'(),]*?)?\s*)?\)/g
const PLAIN = /^[A-Za-z_][A-Za-z0-9_]*$/

/** Puts ids that are no plain words into quotes, as a formula wants them: `flow(105)` is `flow("105")`. The rest stays. */
export function quoteIds(text: string): string {
  return text.replace(CALL, (whole, name: string, stream?: string, comma?: string, component?: string) => {
    if (stream === undefined || (comma !== undefined && component === undefined)) return whole
    if (PLAIN.test(stream) && (component === undefined || PLAIN.test(component))) return whole
    const quoted = (id: string) => (PLAIN.test(id) ? id : JSON.stringify(id))
    return `${name}(${quoted(stream)}${component === undefined ? '' : `, ${quoted(component)}`})`
  })
}
