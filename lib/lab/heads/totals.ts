import { remember } from '../cells/remember'
import { plainSpaces } from '../cells/spaces'
import { headWords } from './roles'

const SUMS =
  'sum|total|totals|summe|gesamt|gesamtsumme|grand total|sum total|total sum|Σ|σ|subtotal|zwischensumme|closure|total sum|sum all|summe gesamt|overall total|check sum|checksum|kontrollsumme|total all'
const STATISTICS =
  'mean|average|avg|ave|arithmetic mean|mittelwert|mittel|durchschnitt|mw|median|std|std dev|stddev|stdev|st dev|sd|s d|standard deviation|standardabweichung|stabw|std abw|rsd|rel std dev|relative standard deviation|cv|vk|variationskoeffizient|variance|varianz|min|minimum|max|maximum|range|spannweite|count|anzahl|sem|ci|std error|standard error|standardfehler|mean value|average value|geometric mean|rel sd'
const LIMITS =
  'lod|loq|dl|mdl|rl|pql|mrl|ql|detection limit|limit of detection|limit of quantification|limit of quantitation|quantification limit|quantitation limit|reporting limit|method detection limit|det limit|det lim|detection limits|nachweisgrenze|bestimmungsgrenze|nwg|bg|berichtsgrenze|limit|limits|spec|specification|spec limit|spezifikation|grenzwert|grenzwerte|target|sollwert|spec min|spec max'
const columnWords = new Set([SUMS, STATISTICS, LIMITS].flatMap((spelled) => spelled.split('|')))
const rowWords = new Set([...columnWords, 's', 'n', '±'])

/** What may stand behind a total's word: "(n=3)", "of 101-103", "%", "[wt%]", "± SD". */
const TAIL =
  /^(.*?)(?: ?[([{].*[)\]}]| ?%| ?n ?= ?\d+| (?:of|over|from|der|von|aus|for|für|über|aller|all)\b.*| ?\d+ ?σ)+$/i
const MEAN =
  /^(?:mean|average|avg|mittelwert|durchschnitt|median|std\.? ?dev\.?|stdev|standardabweichung|standard deviation|rsd|minimum|maximum|stabw)\b[ .:]/i

/** Whether a column's name is of sums, statistics or limits. "Total P" and "N" are analytes. */
export const isTotalColumn: (name: string) => boolean = remember(isTotalColumnAfresh)

function isTotalColumnAfresh(name: string): boolean {
  return (
    isTotal(name, columnWords) ||
    /^(?:sum|summe|mittelwert|mean|average) (?:of|der|von|aller) /i.test(plainSpaces(name))
  )
}

/** Whether a row's label is of sums, statistics or limits: also "Mean 108", "s", "n". */
export function isTotalRow(label: string): boolean {
  const spelled = plainSpaces(label)
  if (/^\d/.test(spelled)) return false
  return isTotal(spelled, rowWords) || MEAN.test(spelled)
}

function isTotal(text: string, words: Set<string>): boolean {
  const spelled = plainSpaces(text).replace(/^[([]|[)\]]$/g, '')
  // N is nitrogen and S sulphur; only the small letters are a count and a deviation.
  if (spelled === '' || spelled.length > 60 || /^(?:N|S|CV|Ci|Mw)$/.test(spelled)) return /^CV$/.test(spelled)
  if (words.has(headWords(spelled))) return true
  const head = TAIL.exec(spelled)?.[1]
  if (head !== undefined && words.has(headWords(head))) return true
  const parts = spelled.split(/ ?(?:±|\+\/-|\/|,|and|und|&) ?/)
  return parts.length > 1 && parts.every((part) => words.has(headWords(part)))
}
