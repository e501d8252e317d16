/** The parts of the workbench that F6 goes round, in the order of the screen. */
const first = 'button:not([disabled]), input:not([disabled]), select:not([disabled]), textarea:not([disabled]), a[href]'

/**
 * Back to the cell that the cursor stands on, once a menu or dialog has gone; unless it was asked for (`always`) not where
 * something else took the focus meanwhile. A dialog gives the focus back a moment after it shuts, so this waits for that.
 */
export function backToCell(pane: 'table' | 'links', always = false): void {
  setTimeout(
    () => {
      const { activeElement: focused } = document
      if (!always && focused && focused !== document.body) return
      document.querySelector<HTMLElement>(`#grid-${pane} .grid-cell[tabindex="0"]`)?.focus({ preventScroll: true })
    },
    always ? 60 : 30,
  )
}

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
