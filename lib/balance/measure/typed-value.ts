import type { Model } from '../model'
import type { Given, Quantity } from '../problem'
import { flowFactor, parseFlowUnit, parseFractionUnit } from './units-of-measure'

/** A typed value in the book's units: flows in `model.units`, fractions of 1. */
export type TypedValue = { value: number; halfWidth: number; sigma?: number }

/** Without a half-width of its own a value is held to this part of itself. */
export const DEFAULT_HALF_WIDTH = 1e-9

/** Fractions and ratios, which have units of their own; every other quantity is a flow. */
export const isRatio = (quantity: Quantity): boolean => quantity.endsWith('Fraction') || quantity.endsWith('Ratio')

/** Multiplier from a given's unit to the book's; 1 where none is typed. NaN where it does not fit (a checked problem has none). */
export function unitFactor(
  model: Pick<Model, 'units' | 'problem'>,
  quantity: Quantity,
  unit: string | undefined,
): number {
  if (unit === undefined) return 1
  if (isRatio(quantity)) return parseFractionUnit(unit)?.factor ?? Number.NaN
  const typed = parseFlowUnit(unit)
  const { mass, mole, volume } = model.units
  const own = model.problem.basis === 'mass' ? mass : mole
  const wanted =
    quantity === 'flow' || quantity === 'componentFlow'
      ? own
      : quantity === 'volumeFlow'
        ? volume
        : quantity === 'massFlow' || quantity === 'componentMassFlow'
          ? mass
          : mole
  return (typed && flowFactor(typed, wanted)) ?? Number.NaN
}

/**
 * Value and half-width of a given in the book's units. Without a half-width: 1e-9 of the value; for a value of 0, 1e-9
 * for a ratio and 1e-9 of the largest flow typed (1 where none is) for a flow.
 */
export function typedValue(model: Model, given: Given, largestFlow = 1): TypedValue {
  const factor = unitFactor(model, given.quantity, given.unit)
  const value = given.value * factor
  const size = value !== 0 ? Math.abs(value) : isRatio(given.quantity) ? 1 : largestFlow
  return {
    value,
    halfWidth: given.halfWidth === undefined ? DEFAULT_HALF_WIDTH * size : given.halfWidth * factor,
    ...(given.sigma !== undefined && { sigma: given.sigma * factor }),
  }
}
