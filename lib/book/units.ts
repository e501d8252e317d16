import {
  bookUnits,
  type FlowUnit,
  type FractionUnit,
  flowFactor,
  flowUnitSymbols,
  fractionUnitSymbols,
  parseFlowUnit,
  parseFractionUnit,
} from '@/lib/balance/measure/units-of-measure'
import type { Basis, Quantity } from '@/lib/balance/problem'

/** What a unit of measure is of; a fraction unit may stand on one basis or both. */
export type UnitKind = 'mass' | 'mole' | 'volume' | 'massFraction' | 'moleFraction'

export type ParsedUnit = { of: 'flow'; unit: FlowUnit } | { of: 'fraction'; unit: FractionUnit }

/** Reads a unit as typed ("t/d", "ppm", "kg"); undefined where it is not known. The empty text is a fraction of 1. */
export function parseUnit(text: string): ParsedUnit | undefined {
  const flow = parseFlowUnit(text)
  if (flow) return { of: 'flow', unit: flow }
  const fraction = parseFractionUnit(text)
  return fraction && { of: 'fraction', unit: fraction }
}

/** The same value in another unit; undefined where the two do not fit each other or one is not known. */
export function convert(value: number, from: string, to: string): number | undefined {
  const a = parseUnit(from)
  const b = parseUnit(to)
  if (a?.of === 'flow' && b?.of === 'flow') {
    const factor = flowFactor(a.unit, b.unit)
    return factor === undefined ? undefined : value * factor
  }
  if (a?.of !== 'fraction' || b?.of !== 'fraction') return undefined
  if (a.unit.only && b.unit.only && a.unit.only !== b.unit.only) return undefined
  return value * (a.unit.factor / b.unit.factor)
}

/** What kind of unit a quantity takes on a basis. */
export function unitKindOf(quantity: Quantity, basis: Basis): UnitKind {
  switch (quantity) {
    case 'flow':
    case 'componentFlow':
      return basis
    case 'massFlow':
    case 'componentMassFlow':
      return 'mass'
    case 'moleFlow':
    case 'componentMoleFlow':
      return 'mole'
    case 'volumeFlow':
      return 'volume'
    case 'massFraction':
    case 'dryMassFraction':
    case 'elementMassFraction':
    case 'groupMassRatio':
      return 'massFraction'
    case 'moleFraction':
    case 'dryMoleFraction':
    case 'groupMoleRatio':
      return 'moleFraction'
  }
}

/** Units to offer, the common first; `batch` for a book whose flow unit is a bare amount. */
export function unitsFor(kind: UnitKind, batch = false): string[] {
  return kind === 'massFraction' || kind === 'moleFraction' ? fractionUnitSymbols(kind) : flowUnitSymbols(kind, batch)
}

/** The unit in which a book shows a quantity: its own, the matching one of the other basis, m3, or a fraction of 1. */
export function bookUnitOf(quantity: Quantity, basis: Basis, flowUnit: string): string | undefined {
  const kind = unitKindOf(quantity, basis)
  if (kind === 'massFraction' || kind === 'moleFraction') return '1'
  return bookUnits(basis, flowUnit)?.[kind].symbol
}

/** True where a typed unit can stand for a quantity of a book. */
export function unitFits(unit: string, quantity: Quantity, basis: Basis, flowUnit: string): boolean {
  const kind = unitKindOf(quantity, basis)
  if (kind === 'massFraction' || kind === 'moleFraction') {
    const read = parseFractionUnit(unit)
    return read !== undefined && (read.only === undefined || read.only === kind)
  }
  const read = parseFlowUnit(unit)
  const own = bookUnits(basis, flowUnit)?.[kind]
  return read !== undefined && own !== undefined && flowFactor(read, own) !== undefined
}

/** A typed value in the book's unit for the quantity, or undefined where the unit does not fit. */
export function toBookUnit(
  value: number,
  unit: string,
  quantity: Quantity,
  basis: Basis,
  flowUnit: string,
): number | undefined {
  if (!unitFits(unit, quantity, basis, flowUnit)) return undefined
  const own = bookUnitOf(quantity, basis, flowUnit)
  return own === undefined ? undefined : convert(value, unit, own)
}
