import { statedBasis } from '../cells/basis'
import { plainSpaces } from '../cells/spaces'
import { roleOf } from '../heads/roles'
import { type Grid, textOf } from './grid'
import type { Titled } from './read-long'

/** What the lines above a table say of all of it: its basis, and the sample it is of ("Sample: 24-0311"). */
export function readTitles(grid: Grid, rows: number[]): { basis?: string; titled: Titled } {
  const titled: Titled = {}
  const bases = new Set<string>()
  for (const at of rows) {
    const cells = (grid.rows[at] ?? []).map((cell) => plainSpaces(textOf(cell))).filter((text) => text !== '')
    const basis = statedBasis(cells.join(' '))
    if (basis) bases.add(basis)
    for (const [index, cell] of cells.entries()) {
      const inner = /^([^:]{2,40}): ?(\S.*)$/.exec(cell)
      const [label, value] = inner ? [inner[1] as string, inner[2] as string] : [cell, cells[index + 1]]
      if (value === undefined) continue
      const role = roleOf(label.replace(/:$/, ''))
      if (role === 'id') titled.id ??= value
      else if (role === 'stream' || role === 'point') titled.stream ??= value
      else if (role === 'date') titled.taken ??= value
    }
  }
  return { ...(bases.size === 1 && { basis: [...bases][0] as string }), titled }
}
