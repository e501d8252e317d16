import { numberFormat } from './number-format'
import { componentLabel } from './table-model'
import { fillRow, nextRow, putLive, putNumber, putText } from './xlsx-cells'
import { at, type ClosureSheet, columns, putBand } from './xlsx-closure-sheet'
import { type Ref, unknownText } from './xlsx-formulas'
import * as style from './xlsx-styles'

/** One cell a reaction: its extent, or the mark of an unknown one. */
export function putExtents({ sheet, closure, extents }: ClosureSheet): void {
  if (closure.extents.length === 0) return
  putBand(sheet, 'Reactions: extents', { in: 'extent' })
  for (const { tag, name, unit, value } of closure.extents) {
    const row = nextRow(sheet)
    fillRow(row, columns.formed, columns.finding, style.rowLabel)
    putText(row.getCell(columns.place), `${tag} in ${unit}`, style.rowLabel)
    putText(row.getCell(columns.component), name, style.rowLabel)
    putText(row.getCell(columns.unit), closure.extentUnit, style.rowUnit)
    const cell = row.getCell(columns.in)
    if (value === null) putText(cell, style.stateMarks.unknown, style.stateStyles.unknown)
    else putNumber(cell, value, numberFormat(value, 5), style.stateStyles.solvable)
    extents.push({ at: at('in', row.number), value })
  }
}

/** One row a reaction and component: what is formed, from cells that a reader can check. */
export function putFormations({ sheet, table, closure, extents, formations }: ClosureSheet): void {
  if (closure.formations.length === 0) return
  const mass = table.basis === 'mass'
  putBand(sheet, `Reactions: formed = coefficient ${mass ? 'x molar mass x scale ' : ''}x extent`, {
    in: 'coefficient',
    ...(mass && { out: 'molar mass', formed: 'scale' }),
    difference: 'formed',
  })
  for (const { reaction, component, coefficient, molarMass, scale } of closure.formations) {
    const extent = extents[reaction] as Ref
    const row = nextRow(sheet)
    fillRow(row, columns.unit, columns.finding, style.rowLabel)
    putText(row.getCell(columns.place), closure.extents[reaction]?.tag ?? '', style.rowLabel)
    putText(row.getCell(columns.component), componentLabel(table.components[component]), style.rowLabel)
    putText(row.getCell(columns.unit), table.flowUnit, style.rowUnit)
    const factors = [at('in', row.number)]
    putNumber(row.getCell(columns.in), coefficient, 'General', style.figure)
    if (mass) {
      putNumber(row.getCell(columns.out), molarMass, 'General', style.figure)
      putNumber(row.getCell(columns.formed), scale, '0.000000', style.figure)
      factors.push(at('out', row.number), at('formed', row.number))
    }
    const value = extent.value === null ? null : coefficient * molarMass * scale * extent.value
    const formula = `IF(ISNUMBER(${extent.at}),${factors.join('*')}*${extent.at},"${unknownText}")`
    const cell = row.getCell(columns.difference)
    putLive(cell, { formula, result: value ?? unknownText }, numberFormat(value ?? 0, 6), style.figure)
    formations.push({ at: at('difference', row.number), value })
  }
}

/** Where a reactor is balanced by element: moles of atoms that a unit of flow brings. */
export function putContents({ sheet, table, closure, contents }: ClosureSheet): void {
  if (closure.contents.length === 0) return
  putBand(sheet, `Elements: moles of atoms in one ${table.flowUnit} of a component`, { in: 'atoms', out: 'moles' })
  for (const { component, element, atoms, perFlow } of closure.contents) {
    const row = nextRow(sheet)
    putText(row.getCell(columns.place), element, style.rowLabel)
    putText(row.getCell(columns.component), componentLabel(table.components[component]), style.rowLabel)
    putText(row.getCell(columns.unit), closure.extentUnit, style.rowUnit)
    putNumber(row.getCell(columns.in), atoms, 'General', style.figure)
    putNumber(row.getCell(columns.out), perFlow, numberFormat(perFlow, 6), style.figure)
    contents.push({ at: at('out', row.number), value: perFlow })
  }
}
