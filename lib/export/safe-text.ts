/** More would make a spreadsheet program call the file damaged. */
const longestCell = 32_767
const longestHeader = 255

/** What a spreadsheet program would take for a formula if it were typed. */
export const looksLikeFormula = (text: string): boolean => /^[=+\-@\t\r]/.test(text)

/** Text as a workbook can hold it: no control characters, no halves of a character, not too long. */
export function cellText(text: string): string {
  const sound = text
    .replace(/\r\n?/g, '\n')
    // biome-ignore lint/suspicious/noControlCharactersInRegex: these are what XML 1.0 cannot hold.
    .replace(/[\u0000-\u0008\u000b\u000c\u000e-\u001f\u007f\ufffe\uffff]/g, '')
    .replace(/[\ud800-\udbff](?![\udc00-\udfff])|(?<![\ud800-\udbff])[\udc00-\udfff]/g, '\ufffd')
    // "_x0041_" in a workbook means the character 41; the underscore itself is written so.
    .replace(/_(?=x[0-9a-fA-F]{4}_)/g, '_x005F_')
  return sound.length <= longestCell ? sound : `${sound.slice(0, longestCell - 2)}…`
}

/** Text inside a page header or footer, where & starts a code: at most `longest` characters with every & doubled. */
export function headerText(text: string, longest: number): string {
  let written = ''
  for (const character of cellText(text.replace(/\s+/g, ' ').trim())) {
    const next = character === '&' ? '&&' : character
    if (written.length + next.length >= longest) return `${written}…`
    written += next
  }
  return written
}

/** Left, centre and right of a header or footer; the whole has at most 255 characters in the file format. */
export function pageLine(left: string, centre: string, right: string): string {
  // &8 is the size; the space keeps a digit that follows out of it.
  const line = `&L&8 ${left}&C&8 ${centre}&R&8 ${right}`
  if (line.length > longestHeader) throw new Error(`A page line of ${line.length} characters damages the file`)
  return line
}
