/** Printed in full wherever results leave the program. */
export const cautions: readonly string[] = [
  'Material balance only: no phase equilibrium, solubility, kinetics or energy check.',
  'Closed is not the same as correct; normal flow is not design or maximum flow.',
  'Not for relief, flare, hazardous-area, exposure or permit figures without independent work; traces of toxic or flammable components can vanish in rounding.',
  'Local codes and licensed practice decide.',
]

/** One line for the foot of a page. */
export const shortCaution = 'Material balance only: read the caution on the sheet Notes'

export const preliminary = 'Preliminary - not issued'
