/**
 * A boundary round some units, counted as typed, before any step: `degreesOfFreedom` = unknowns - balances - sums - rules.
 * `independent` is the rank of those equations at a generic solution, `redundant` the equations beyond it.
 */
export type Boundary = {
  units: string[]
  crossing: string[]
  unknowns: number
  balances: number
  sums: number
  rules: number
  degreesOfFreedom: number
  independent: number
  redundant: number
  over: boolean
  /** Nothing unknown, all of it follows from this boundary alone, some of it, none of it. */
  status: 'done' | 'ready' | 'partly' | 'short'
}
