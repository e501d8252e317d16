/** What a closed table does not say. Short in the footer of the workbench; in full where results leave the program. */
export function Caution({ full }: { full?: boolean }) {
  if (!full)
    return (
      <p className="text-2xs text-ink-3">
        Material balance only; not a basis for relief, hazard or permit figures without the review that local codes and
        licensed practice require.
      </p>
    )
  return (
    <p className="max-w-[110ch] text-xs text-ink-3">
      Material balance only: no phase equilibrium, solubility, kinetics or energy check. Closed is not the same as
      correct, and normal flow is not design or maximum flow. Not for relief, flare, hazardous-area, exposure or permit
      figures without independent work; traces of toxic or flammable components can vanish in rounding. Local codes and
      licensed practice decide.
    </p>
  )
}
