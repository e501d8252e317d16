import type { ResultKind } from '../model'

/** Words that stand in place of a number, English and German: common practice of laboratories. */
const words: [ResultKind, string[]][] = [
  [
    'notDetected',
    ['nd', 'n d', 'n/d', 'nn', 'n n', 'not detected', 'none detected', 'non detect', 'nondetect', 'undetected'],
  ],
  ['notDetected', ['nicht nachweisbar', 'nicht nachgewiesen', 'nicht detektiert', 'not detectable', 'not found']],
  ['trace', ['trace', 'traces', 'tr', 'trc', 'spur', 'spuren', 'in spuren', 'trace amount', 'trace amounts']],
  ['notAnalysed', ['na', 'n a', 'n/a', 'nr', 'n r', 'n/r', 'nb', 'n b', 'nm', 'n m', 'nt', 'n t', 'is', 'i s']],
  ['notAnalysed', ['not analysed', 'not analyzed', 'not reported', 'not required', 'not measured', 'not tested']],
  ['notAnalysed', ['not determined', 'not requested', 'not applicable', 'not available', 'insufficient sample']],
  ['notAnalysed', ['nicht bestimmt', 'nicht analysiert', 'nicht gemessen', 'nicht untersucht', 'nicht beauftragt']],
  ['notAnalysed', ['entfällt', 'keine angabe', 'k a', 'ka', '#n/a', '#nv', '#n/v', '/ /', '*nv']],
  ['difference', ['by difference', 'by diff', 'difference', 'diff', 'by balance', 'balance', 'bal', 'rest']],
  ['difference', ['remainder', 'remaining', 'differenz', 'aus differenz', 'als differenz', 'ausgleich']],
  ['below', ['bdl', 'bld', 'b d l', 'lod', 'bloq', 'blq', 'bql', 'blod', 'bmdl', 'brl', 'bnwg', 'bbg']],
  ['below', ['below detection', 'below detection limit', 'below limit', 'below lod', 'below loq', 'below dl']],
  ['below', ['unter nachweisgrenze', 'unter der nachweisgrenze', 'unter bestimmungsgrenze', 'unter nwg', 'unter bg']],
  ['below', ['unter der bestimmungsgrenze', 'u nwg', 'u bg', 'u n g', 'u b g', 'ung', 'ubg', 'kleiner nwg']],
]
const kinds = new Map(words.flatMap(([kind, spelled]) => spelled.map((word) => [word, kind] as const)))
// A bare limit's name is a limit only behind "<".
kinds.delete('lod')

const LIMIT_NAMES =
  /^(?:the )?(?:lod|loq|dl|mdl|rl|pql|ql|mrl|bg|nwg|ng|nachweisgrenze|bestimmungsgrenze|detection limit|det\.? ?lim\.?|limit)$/
const DASHES = /^(?:[-−–—‐‑]{1,3}|\.\/\.|-\.-)$/

/** The kind that a whole cell's words say, or undefined. `text`: spaces plain. */
export function wordKind(text: string): ResultKind | undefined {
  if (text.length > 40) return undefined
  if (DASHES.test(text)) return 'notAnalysed'
  const word = text.toLowerCase().replace(/[._]+/g, ' ').replace(/ {2,}/g, ' ').trim()
  return kinds.get(word) ?? kinds.get(word.replace(/^[[(]|[)\]]$/g, ''))
}

/** Whether what stands behind "<" names a limit rather than giving it. */
export function isLimitName(text: string): boolean {
  return LIMIT_NAMES.test(text.toLowerCase().trim())
}

export type Comparison = 'below' | 'above' | 'about'

const SIGNS: [Comparison, RegExp][] = [
  ['below', /^(?:[<＜‹≤≦⩽]=?|&lt;|less than(?: or equal to)?\b|kleiner(?: als)?\b|unter\b)\s*/i],
  ['above', /^(?:[>＞›≥≧⩾]=?|&gt;|(?:greater|more|larger) than\b|größer(?: als)?\b|groesser(?: als)?\b|über\b)\s*/i],
  [
    'about',
    /^(?:[~∼≈≅≃]=?|ca\.?(?= ?[\d.,])|circa\b|c\.(?= ?\d)|about\b|approx(?:\.|imately\b)?|etwa\b|ungefähr\b|rund\b)\s*/i,
  ],
]

/** A comparison sign or word at the start, and what follows it. */
export function leadingComparison(text: string): { kind: Comparison; rest: string } | undefined {
  for (const [kind, sign] of SIGNS) {
    const found = sign.exec(text)
    if (found) return { kind, rest: text.slice(found[0].length) }
  }
  return undefined
}
