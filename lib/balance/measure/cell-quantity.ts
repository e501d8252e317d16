import type { Basis, ExtraQuantity, Quantity } from '../problem'
import type { CellQuantity } from '../solution'

/** The cell that a quantity names in a book of this basis; undefined for volume flow and what has keys of its own. */
export function cellQuantityOn(basis: Basis, quantity: Exclude<Quantity, ExtraQuantity | 'volumeFlow'>): CellQuantity
export function cellQuantityOn(basis: Basis, quantity: Quantity): CellQuantity | undefined
export function cellQuantityOn(basis: Basis, quantity: Quantity): CellQuantity | undefined {
  const mass = basis === 'mass'
  switch (quantity) {
    case 'flow':
    case 'componentFlow':
      return quantity
    case 'massFlow':
      return mass ? 'flow' : 'otherFlow'
    case 'moleFlow':
      return mass ? 'otherFlow' : 'flow'
    case 'componentMassFlow':
      return mass ? 'componentFlow' : 'otherComponentFlow'
    case 'componentMoleFlow':
      return mass ? 'otherComponentFlow' : 'componentFlow'
    case 'massFraction':
      return mass ? 'fraction' : 'otherFraction'
    case 'moleFraction':
      return mass ? 'otherFraction' : 'fraction'
    default:
      return undefined
  }
}

/** The quantity that a cell is called by on this basis. */
export function quantityOn(basis: Basis, cell: CellQuantity): Exclude<Quantity, ExtraQuantity | 'volumeFlow'> {
  const mass = basis === 'mass'
  switch (cell) {
    case 'flow':
    case 'componentFlow':
      return cell
    case 'fraction':
      return mass ? 'massFraction' : 'moleFraction'
    case 'otherFlow':
      return mass ? 'moleFlow' : 'massFlow'
    case 'otherComponentFlow':
      return mass ? 'componentMoleFlow' : 'componentMassFlow'
    case 'otherFraction':
      return mass ? 'moleFraction' : 'massFraction'
  }
}
