/**
 * Units of measure that process engineers type, with exact factors. Sources: SI brochure (9th edition) for the SI and
 * minute, hour, day, litre, tonne; NIST Special Publication 811, appendix B, for pound, tons, gallon, barrel, foot
 * (all exact by definition); a year is 365 d as in SP 811 B.8. Amounts are kept as a factor to kg, kmol and m3.
 */
export type AmountKind = 'mass' | 'mole' | 'volume'
export type FractionKind = 'massFraction' | 'moleFraction'

type Amount = { kind: AmountKind; symbol: string; factor: number }

const POUND = 0.45359237
const INCH = 0.0254
const GALLON = 231 * INCH ** 3

const amounts: [AmountKind, number, string, ...string[]][] = [
  ['mass', 1, 'kg'],
  ['mass', 1e-3, 'g'],
  ['mass', 1e-6, 'mg'],
  ['mass', 1e-9, 'µg', 'ug', 'μg'],
  ['mass', 1e3, 't', 'tonne', 'tonnes', 'Mg'],
  ['mass', 1e6, 'kt', 'Gg'],
  ['mass', 1e9, 'Mt', 'Tg'],
  ['mass', POUND, 'lb', 'lbs'],
  ['mass', 1000 * POUND, 'klb', 'Mlb'],
  ['mass', POUND / 16, 'oz'],
  ['mass', 2000 * POUND, 'st', 'ton_us', 'short_ton', 'short ton'],
  ['mass', 2240 * POUND, 'lt', 'ton_uk', 'long_ton', 'long ton'],
  ['mole', 1, 'kmol'],
  ['mole', 1e-3, 'mol'],
  ['mole', 1e-6, 'mmol'],
  ['mole', 1e3, 'Mmol'],
  ['mole', POUND, 'lbmol', 'lb-mol', 'lb mol'],
  ['mole', 1000 * POUND, 'klbmol'],
  ['mole', 2000 * POUND, 'stmol'],
  ['mole', 2240 * POUND, 'ltmol'],
  ['mole', POUND / 16, 'ozmol'],
  ['volume', 1, 'm3', 'm³', 'm^3'],
  ['volume', 1e-3, 'L', 'l', 'dm3', 'dm³'],
  ['volume', 1e-6, 'mL', 'ml', 'cm3', 'cm³'],
  ['volume', 0.3048 ** 3, 'ft3', 'ft³', 'ft^3', 'cf'],
  ['volume', GALLON, 'gal', 'gal_us', 'US gal'],
  ['volume', 0.00454609, 'gal_uk', 'UK gal'],
  ['volume', 42 * GALLON, 'bbl'],
]

const times: [number, string, ...string[]][] = [
  [1, 's', 'sec'],
  [60, 'min'],
  [3600, 'h', 'hr'],
  [86400, 'd', 'day'],
  [7 * 86400, 'wk', 'week'],
  [365 * 86400, 'a', 'yr', 'y', 'year'],
]

/** Multiplier to a fraction of 1, and on which basis the unit may stand (both when left out). */
const fractions: [number, FractionKind | undefined, string, ...string[]][] = [
  [1, undefined, '1', ''],
  [1e-2, undefined, '%'],
  [1e-3, undefined, '‰'],
  [1e-2, 'massFraction', 'wt%', 'w%', 'wt %', 'w/w%', 'mass%', 'mass %', '%w/w'],
  [1e-2, 'moleFraction', 'mol%', 'mol %', 'mole%', 'mole %'],
  [1e-6, undefined, 'ppm'],
  [1e-9, undefined, 'ppb'],
  [1e-6, 'massFraction', 'ppmw'],
  [1e-9, 'massFraction', 'ppbw'],
  [1e-6, 'moleFraction', 'ppmv', 'ppm mol'],
  [1, 'massFraction', 'kg/kg', 'g/g', 't/t', 'lb/lb'],
  [1e-3, 'massFraction', 'g/kg', 'kg/t', 'mg/g'],
  [1e-6, 'massFraction', 'mg/kg', 'g/t', 'µg/g', 'ug/g', 'μg/g'],
  [1e-9, 'massFraction', 'µg/kg', 'ug/kg', 'μg/kg', 'mg/t'],
  [1, 'moleFraction', 'mol/mol', 'kmol/kmol'],
  [1e-3, 'moleFraction', 'mmol/mol', 'mol/kmol'],
  [1e-6, 'moleFraction', 'µmol/mol', 'umol/mol', 'μmol/mol'],
]

const amountBySymbol = new Map<string, Amount>()
for (const [kind, factor, ...symbols] of amounts)
  for (const symbol of symbols) amountBySymbol.set(symbol, { kind, symbol: symbols[0] as string, factor })
const timeBySymbol = new Map<string, { symbol: string; seconds: number }>()
for (const [seconds, ...symbols] of times)
  for (const symbol of symbols) timeBySymbol.set(symbol, { symbol: symbols[0] as string, seconds })
const fractionBySymbol = new Map<string, { symbol: string; factor: number; only?: FractionKind }>()
for (const [factor, only, ...symbols] of fractions)
  for (const symbol of symbols)
    fractionBySymbol.set(symbol, { symbol: symbols[0] as string, factor, ...(only && { only }) })

/** A flow unit ("kg/h") or a bare amount ("kg"), where `seconds` is null. */
export type FlowUnit = {
  kind: AmountKind
  symbol: string
  amount: string
  factor: number
  time: string | null
  seconds: number | null
}
export type FractionUnit = { symbol: string; factor: number; only?: FractionKind }

/** Reads a flow or amount unit, or gives undefined. Symbols are exact: "Mt" and "mt" are not the same. */
export function parseFlowUnit(text: string): FlowUnit | undefined {
  const trimmed = text.trim()
  const slash = trimmed.lastIndexOf('/')
  const amount = amountBySymbol.get((slash < 0 ? trimmed : trimmed.slice(0, slash)).trim())
  if (!amount) return undefined
  if (slash < 0)
    return {
      kind: amount.kind,
      symbol: amount.symbol,
      amount: amount.symbol,
      factor: amount.factor,
      time: null,
      seconds: null,
    }
  const time = timeBySymbol.get(trimmed.slice(slash + 1).trim())
  if (!time) return undefined
  const symbol = `${amount.symbol}/${time.symbol}`
  return {
    kind: amount.kind,
    symbol,
    amount: amount.symbol,
    factor: amount.factor,
    time: time.symbol,
    seconds: time.seconds,
  }
}

/** Reads a unit of a fraction ("%", "mg/kg"); the empty text is 1. */
export function parseFractionUnit(text: string): FractionUnit | undefined {
  return fractionBySymbol.get(text.trim())
}

/**
 * Multiplier from one flow unit to another of the same kind; undefined where they do not fit (mass to mole, a batch
 * amount to a rate).
 */
export function flowFactor(from: FlowUnit, to: FlowUnit): number | undefined {
  if (from.kind !== to.kind) return undefined
  if (from.seconds === null && to.seconds === null) return from.factor / to.factor
  if (from.seconds === null || to.seconds === null) return undefined
  return (from.factor / to.factor) * (to.seconds / from.seconds)
}

/**
 * The mole unit that goes with a mass unit, so that moles = mass x `perMass` / M with M in kg/kmol:
 * kg kmol 1, g mol 1, mg mmol 1, lb lbmol 1, oz ozmol 1, t kmol 1000, kt Mmol 1000, Mt Mmol 1e6, klb klbmol 1,
 * short ton stmol 1, long ton ltmol 1, µg mmol 1e-3. Time stays. The other way round (a mole book) it is the inverse.
 */
const moleOfMass: Record<string, [string, number]> = {
  kg: ['kmol', 1],
  g: ['mol', 1],
  mg: ['mmol', 1],
  µg: ['mmol', 1e-3],
  lb: ['lbmol', 1],
  klb: ['klbmol', 1],
  oz: ['ozmol', 1],
  st: ['stmol', 1],
  lt: ['ltmol', 1],
  t: ['kmol', 1000],
  kt: ['Mmol', 1000],
  Mt: ['Mmol', 1e6],
}
const massOfMole: Record<string, string> = {
  kmol: 'kg',
  mol: 'g',
  mmol: 'mg',
  lbmol: 'lb',
  klbmol: 'klb',
  ozmol: 'oz',
  stmol: 'st',
  ltmol: 'lt',
  Mmol: 't',
}

/** The units of a book: its own, the matching one of the other basis, and volume per the same time. */
export type BookUnits = {
  mass: FlowUnit
  mole: FlowUnit
  volume: FlowUnit
  /** moles = mass x molesPerMass / M, in the two units above, M in kg/kmol. */
  molesPerMass: number
}

/** undefined where the text is no mass or mole unit, or does not fit the basis. */
export function bookUnits(basis: 'mass' | 'mole', flowUnit: string): BookUnits | undefined {
  const own = parseFlowUnit(flowUnit)
  if (!own || own.kind !== basis) return undefined
  const withTime = (amount: string): FlowUnit =>
    parseFlowUnit(own.time === null ? amount : `${amount}/${own.time}`) as FlowUnit
  const volume = withTime('m3')
  if (basis === 'mass') {
    const [amount, molesPerMass] = moleOfMass[own.amount] as [string, number]
    return { mass: own, mole: withTime(amount), volume, molesPerMass }
  }
  const mass = withTime(massOfMole[own.amount] as string)
  return { mass, mole: own, volume, molesPerMass: 1 }
}

/** Symbols to offer, first the common ones. */
export const flowUnitSymbols = (kind: AmountKind, batch = false): string[] => {
  const bases = amounts.filter(([itsKind]) => itsKind === kind).map(([, , symbol]) => symbol)
  return batch ? bases : bases.flatMap((base) => ['h', 'd', 'min', 's', 'a'].map((time) => `${base}/${time}`))
}
export const fractionUnitSymbols = (kind: FractionKind): string[] =>
  fractions.filter(([, only]) => only === undefined || only === kind).map(([, , symbol]) => symbol)
