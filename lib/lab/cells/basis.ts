import { plainSpaces } from './spaces'

/** Basis words of laboratories, English and German: common practice. */
const known = new Map<string, string>(
  (
    [
      [
        'as-received',
        'as received|as-received|received|a.r.|a.r|ar|arb|as is|as-is|as sampled|wet|wet basis|wet mass|wet weight',
      ],
      [
        'as-received',
        'w.b.|w.b|wb|w.w.|ww|fresh|fresh mass|fresh weight|fresh matter|fm|f.m.|os|o.s.|original|originalsubstanz',
      ],
      [
        'as-received',
        'feucht|nass|frisch|frischmasse|frischsubstanz|fs|anlieferung|anlieferungszustand|im anlieferungszustand',
      ],
      [
        'as-received',
        'roh|on wet basis|wet wt|wet matter|as fed|i.os|i. os|i.d.os|i. d. os|i.fm|bezogen auf os|lieferzustand',
      ],
      [
        'dry',
        'dry|dry basis|dry-basis|d.b.|d.b|db|dry mass|dry weight|dry wt|dry matter|dry solids|dm|d.m.|dw|d.w.|ds|on dry basis',
      ],
      [
        'dry',
        'moisture-free|moisture free|mf|bone dry|bd|ts|t.s.|tm|t.m.|tr|trockensubstanz|trockenmasse|trocken|wasserfrei|wf|w.f.',
      ],
      ['dry', 'i.ts|i. ts|i.d.ts|i. d. ts|i.tm|i. tm|i.d.tm|i.tr|i. tr|bezogen auf ts|oven dry|oven-dry|dried'],
      [
        'dry-ash-free',
        'dry-ash-free|dry ash free|dry ash-free|dry, ash-free|dry, ash free|dry and ash free|d.a.f.|d.a.f|daf|maf|waf',
      ],
      ['dry-ash-free', 'wasser- und aschefrei|wasser und aschefrei|wasseraschefrei|moisture and ash free'],
    ] as const
  ).flatMap(([basis, spelled]) => spelled.split('|').map((word) => [word, basis] as const)),
)

const plain = (text: string): string =>
  plainSpaces(text)
    .toLowerCase()
    .replace(/^(?:basis|bezug|bezogen auf|on|in|auf|per|i\.d\.)[:=]? (?=\S)/, '')
    .replace(/[ _-](?:basis|state)$/, '')

/** The basis that a text names, or undefined where it is no known basis word. */
export function knownBasis(text: string): string | undefined {
  const spelled = plainSpaces(text).toLowerCase()
  return known.get(spelled) ?? known.get(plain(text)) ?? (known.has(`${plain(text)} basis`) ? plain(text) : undefined)
}

/** The basis of a cell in a column or row of bases: a known one by its name, any other as its text. */
export function basisOf(text: string): string | undefined {
  const spelled = plainSpaces(text)
  return spelled === '' || /^[-–—]$/.test(spelled) ? undefined : (knownBasis(spelled) ?? spelled)
}

const TAIL =
  /[ ,;_]+(?:on (?:a )?)?(dry[ -]ash[ -]free|dry basis|dry|wet basis|wet|as[ -]received|as[ -]is|d\.b\.?|db|a\.r\.?|ar|w\.b\.?|wb|d\.a\.f\.?|daf|waf|wf|lufttrocken|air[ -]dried|i\. ?(?:d\. ?)?(?:TS|TM|TR|OS|FM))$/

/** A basis at the end of a head or unit: "wt% dry", "Ash, d.b."; what stands before it, and the basis. */
export function trailingBasis(text: string): { before: string; basis: string } | undefined {
  const found = TAIL.exec(text) ?? TAIL.exec(text.toLowerCase())
  if (!found) return undefined
  const before = text.slice(0, found.index).trim()
  return before === '' ? undefined : { before, basis: knownBasis(found[1] as string) ?? (found[1] as string) }
}

/** The one basis that a title line states for the whole table ("All results on dry basis"), or undefined. */
export function statedBasis(line: string): string | undefined {
  const text = plainSpaces(line).toLowerCase()
  const found = new Set<string>()
  for (const [words, basis] of [
    [/\b(?:dry[ -]ash[ -]free|daf|waf)\b/, 'dry-ash-free'],
    [/\bdry[ -]basis\b|\bbasis: ?dry\b|\bbezug: ?(?:ts|tm|trocken\w*)\b|\bbezogen auf (?:ts|tm|trocken\w*)\b/, 'dry'],
    [
      /\b(?:as received|wet basis|basis: ?(?:wet|ar))\b|\bbezug: ?(?:os|fm|frisch\w*|original\w*)\b|\bbezogen auf (?:os|fm|frisch\w*|original\w*)\b/,
      'as-received',
    ],
  ] as const)
    if (words.test(text)) found.add(basis)
  if (found.size !== 1 || /\b(?:unless|except|außer|sofern)\b/.test(text)) return undefined
  return /\b(?:results?|values?|basis|bezug|bezogen|reported|all|ergebnisse|angaben|alle|werte|analys\w+)\b/.test(text)
    ? [...found][0]
    : undefined
}
