import { plainSpaces } from '../cells/spaces'
import { roleOf } from '../heads/roles'

const OPENING =
  /^(?:[*†‡§¹²³]|\(?\d\)|\(?[a-z]\) |n\.?[dan]\.? ?[:=]|<|(?:note|remark|comment|legend|legende|footnote|fußnote|anmerkung|bemerkung|hinweis|authori[sz]ed|approved|signed|signature|checked|reported|prepared|released|geprüft|freigegeben|erstellt|unterschrift|end of|ende|page|seite|all (?:results|values)|alle|results?|ergebnisse|values?|werte|these|the|this|die|diese|printed|generated|version|copyright|analysed by|analyst|method|data)\b)/i

/** Whether the text that a row begins with is a title or foot line rather than a sample's id. */
export function isProse(text: string): boolean {
  const spelled = plainSpaces(text)
  return (
    spelled.length > 48 ||
    /[:!?]$/.test(spelled) ||
    / = /.test(spelled) ||
    /: /.test(spelled) ||
    spelled.split(' ').length >= 5 ||
    OPENING.test(spelled) ||
    roleOf(spelled) !== undefined
  )
}

/** The build of an id: "24-0312-A" and "24-0311-B" are built alike. */
export function buildOf(id: string): string {
  return plainSpaces(id)
    .replace(/\d+/g, '9')
    .replace(/\p{L}+/gu, 'A')
}
