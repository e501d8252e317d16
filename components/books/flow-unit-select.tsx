import type { ComponentProps } from 'react'
import { Select } from '@/components/ui/select'
import { flowUnitSymbols } from '@/lib/balance/measure/units-of-measure'

export type Basis = 'mass' | 'mole'

export const commonFlowUnits: Record<Basis, readonly string[]> = {
  mass: ['kg/h', 't/h', 't/d', 'kg/s', 'lb/h'],
  mole: ['kmol/h', 'mol/s', 'mol/h', 'lbmol/h'],
}

/** The flow units of a basis: the common ones, the rest, and amounts for a batch. */
export function FlowUnitSelect({ basis, ...rest }: ComponentProps<typeof Select> & { basis: Basis }) {
  const common = commonFlowUnits[basis]
  const others = flowUnitSymbols(basis).filter((symbol) => !common.includes(symbol))
  return (
    <Select {...rest}>
      {[
        { label: 'Common', symbols: common },
        { label: 'Other flows', symbols: others },
        { label: 'Amounts of a batch', symbols: flowUnitSymbols(basis, true) },
      ].map(({ label, symbols }) => (
        <optgroup key={label} label={label}>
          {symbols.map((symbol) => (
            <option key={symbol}>{symbol}</option>
          ))}
        </optgroup>
      ))}
    </Select>
  )
}
