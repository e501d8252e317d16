/** The parts of the workbench that F6 goes round, in the order of the screen. */
const first = 'button:not([disabled]), input:not([disabled]), select:not([disabled]), textarea:not([disabled]), a[href]'

/** Puts the focus into the next part, or with Shift the one before; true when there was one. */
export function goToNextRegion(root: HTMLElement, back: boolean): boolean {
  const regions = [...root.querySelectorAll<HTMLElement>('[data-region]')]
  const at = regions.findIndex((region) => region.contains(document.activeElement))
  for (let step = 1; step <= regions.length; step++) {
    const region = regions[(at + (back ? -step : step) + regions.length * 2) % regions.length]
    const target =
      region?.querySelector<HTMLElement>('.grid-cell[tabindex="0"]') ?? region?.querySelector<HTMLElement>(first)
    if (target) {
      target.focus()
      return true
    }
  }
  return false
}
