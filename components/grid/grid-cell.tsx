import { memo } from 'react'
import { classNames } from '@/components/ui/class-names'
import type { CellTone } from '@/hooks/grid-model'

const tones: Record<CellTone, string> = {
  given: 'cell-given',
  solvable: 'cell-solvable',
  unknown: 'cell-unknown',
  atOdds: 'cell-at-odds',
  absent: 'cell-absent',
  plain: 'grid-plain',
  in: 'grid-in',
  out: 'grid-out',
  tag: 'grid-tag',
  name: 'grid-name',
  end: 'grid-end',
  label: 'grid-label',
  total: 'grid-label grid-bold',
  kind: 'grid-unit',
  section: 'grid-section',
}

export type GridCellProps = {
  id: string
  row: string
  column: string
  role: 'columnheader' | 'rowheader' | 'gridcell'
  columnIndex: number
  span?: number | undefined
  left?: number | undefined
  width?: number | undefined
  text: string
  aside?: string | undefined
  label: string
  tone: CellTone
  bold?: boolean | undefined
  mark?: 'wrong' | 'flag' | 'broken' | undefined
  kept?: 'check' | 'withdrawn' | 'difference' | undefined
  readings?: number | undefined
  description?: string | undefined
  capped?: boolean | undefined
  selected: boolean
  tabStop: boolean
  readOnly: boolean
  expanded?: boolean | undefined
  /** Order in the wave of newly settled cells; undefined: no wave. */
  wave?: number | undefined
}

/** One cell: fill, edge, mark and accessible name, from plain values, so that only what changed is drawn again. */
export const GridCell = memo(function GridCell(props: GridCellProps) {
  const { tone, text, mark } = props
  return (
    // biome-ignore lint/a11y/useAriaPropsSupportedByRole: the role is one of the three kinds of cell
    <div
      id={props.id}
      role={props.role}
      data-row={props.row}
      data-column={props.column}
      data-readings={props.readings}
      aria-colindex={props.columnIndex}
      aria-colspan={props.span}
      aria-label={props.label}
      aria-description={props.description}
      aria-selected={props.selected || undefined}
      aria-readonly={props.role === 'gridcell' && props.readOnly ? true : undefined}
      aria-invalid={mark === 'wrong' ? true : undefined}
      aria-expanded={props.expanded}
      title={
        props.description ??
        (tone === 'name' || tone === 'label' ? [text, props.aside].filter(Boolean).join(', ') : undefined)
      }
      tabIndex={props.tabStop ? 0 : -1}
      className={classNames(
        'grid-cell',
        tones[tone],
        mark === 'wrong' && 'cell-wrong',
        mark === 'flag' && 'grid-flagged',
        mark === 'broken' && 'grid-broken',
        props.bold && 'grid-bold',
        props.selected && 'grid-selected',
        props.capped && 'grid-capped',
        props.wave !== undefined && 'cell-settles',
      )}
      style={{
        left: props.left,
        width: props.width,
        ...(props.wave === undefined ? {} : ({ '--wave': props.wave } as object)),
      }}
    >
      {tone === 'unknown' || tone === 'absent' ? <span className="cell-mark">{text}</span> : text}
      {props.kept ? <span className={classNames('grid-kept', `cell-kept-${props.kept}`)} aria-hidden="true" /> : null}
      {props.aside ? <small>{props.aside}</small> : null}
    </div>
  )
})
