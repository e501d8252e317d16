import { parseFlowUnit } from '@/lib/balance/measure/units-of-measure'
import { convert } from '@/lib/book/units'
import { formatNumber } from '@/lib/sheet/format'
import { type BookView, isFraction, rowUnit } from '../book-view'
import type { RowPlace } from '../rows'

const offered: Record<'mass' | 'mole' | 'volume', string[]> = {
  mass: ['kg/h', 't/h', 't/d', 'kg/s', 'lb/h'],
  mole: ['kmol/h', 'mol/s', 'lbmol/h'],
  volume: ['m3/h', 'L/s', 'm3/d'],
}
const batches: Record<'mass' | 'mole' | 'volume', string[]> = {
  mass: ['kg', 't', 'lb'],
  mole: ['kmol', 'mol'],
  volume: ['m3', 'L'],
}

const ratioUnits: readonly [unit: string, shown: string][] = [
  ['1', 'of 1'],
  ['%', '%'],
  ['ppm', 'ppm'],
]

/** The same value in other units that people ask for: "10.94 t/h". */
export function otherUnits(view: BookView, row: RowPlace, value: number): string[] {
  const { decimal } = view
  const { symbol } = rowUnit(view, row)
  if (row.quantity === 'measure')
    return ratioUnits.flatMap(([unit, shown]) => {
      const other = unit === symbol ? undefined : convert(value, symbol, unit)
      return other === undefined ? [] : [`${formatNumber(other, 'flow', { decimal })} ${shown}`]
    })
  if (isFraction(row.quantity)) {
    const share = formatNumber(value / 100, 'fraction', { decimal })
    const ppm = value < 1 ? [`${formatNumber(value * 1e4, 'flow', { decimal })} ppm`] : []
    return [`${share} of 1`, ...ppm]
  }
  const own = parseFlowUnit(symbol)
  if (!own) return []
  return (own.seconds === null ? batches : offered)[own.kind]
    .filter((unit) => unit !== symbol)
    .flatMap((unit) => {
      const other = convert(value, symbol, unit)
      return other === undefined ? [] : [`${formatNumber(other, 'flow', { decimal })} ${unit}`]
    })
    .slice(0, 4)
}
