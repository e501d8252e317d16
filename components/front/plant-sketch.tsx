import { classNames } from '@/components/ui/class-names'
import { CellState } from '@/lib/balance/solution'
import type { CellKey } from './plant'
import type { PlantView } from './plant-view'
import { showNumber, stateWords } from './plant-words'

type Line = { stream: string; path: string; tag: [x: number, y: number]; arrow: [x: number, y: number, turn: number] }

const lines: Line[] = [
  { stream: '1', path: 'M4 66H102', tag: [51, 66], arrow: [102, 66, 0] },
  { stream: '2', path: 'M194 66H288', tag: [240, 66], arrow: [288, 66, 0] },
  { stream: '3', path: 'M334 40V13H464', tag: [396, 13], arrow: [464, 13, 0] },
  { stream: '4', path: 'M380 66H490', tag: [432, 66], arrow: [490, 66, 0] },
  { stream: '5', path: 'M334 92V124H148V92', tag: [240, 124], arrow: [148, 92, -90] },
]

/** The edges of the states, as lines: given solid, solvable now dotted, still unknown thin and broken, at odds heavy. */
const strokes: Record<CellState, string> = {
  [CellState.absent]: 'stroke-absent-ink',
  [CellState.given]: 'stroke-given-edge [stroke-width:3]',
  [CellState.solvable]: 'stroke-solved-edge [stroke-dasharray:0.1_5] [stroke-width:3] [stroke-linecap:round]',
  [CellState.unknown]: 'stroke-unknown-ink [stroke-dasharray:9_6] [stroke-width:1.3]',
  [CellState.atOdds]: 'stroke-odds-edge [stroke-width:3]',
}

const flowOf = (view: PlantView, stream: string) => view.cells[`flow/${stream}` as CellKey]

function Box({ x, tag, name }: { x: number; tag: string; name: string }) {
  return (
    <g>
      <rect x={x} y="40" width="92" height="52" rx="8" className="fill-rail stroke-hair-2" strokeWidth="1.5" />
      <text x={x + 46} y="62" textAnchor="middle" className="fill-ink font-heading text-base font-semibold">
        {tag}
      </text>
      <text x={x + 46} y="79" textAnchor="middle" className="fill-ink-2 text-xs">
        {name}
      </text>
    </g>
  )
}

/** The plant as two boxes and five lines. The lines tell the states of the total flows, as the table's edges do. */
export function PlantSketch({ view, className }: { view: PlantView; className?: string }) {
  const said = lines.map(({ stream }) => {
    const cell = flowOf(view, stream)
    const flow = cell?.value == null ? '' : ` ${showNumber(cell.value, 'flow', cell.state === CellState.given)} kg/h`
    return `stream ${stream}${flow} ${stateWords[cell?.state ?? CellState.unknown]}`
  })
  return (
    <svg viewBox="0 0 494 138" className={className} role="img" aria-label={`Flow sketch: ${said.join('; ')}.`}>
      {lines.map(({ stream, path, tag: [x, y], arrow: [ax, ay, turn] }) => {
        const cell = flowOf(view, stream)
        const state = cell?.state ?? CellState.unknown
        const value = cell?.value == null ? null : showNumber(cell.value, 'flow', cell.state === CellState.given)
        const width = value ? 27 + value.length * 7.2 : 28
        return (
          <g key={stream}>
            <path d={path} fill="none" className={strokes[state]} />
            <path
              d="M-9 -5L0 0L-9 5"
              transform={`translate(${ax} ${ay}) rotate(${turn})`}
              fill="none"
              className="stroke-ink-2"
              strokeWidth="1.6"
              strokeLinecap="round"
              strokeLinejoin="round"
            />
            <rect x={x - width / 2} y={y - 11} width={width} height="22" rx="6" className="fill-sheet stroke-hair" />
            <text x={x} y={y + 4.5} textAnchor="middle" className={classNames('fill-ink text-sm')}>
              <tspan className="font-heading font-semibold">{stream}</tspan>
              {value ? (
                <tspan dx="6" className="fill-ink-2 font-mono text-xs">
                  {value}
                </tspan>
              ) : null}
            </text>
          </g>
        )
      })}
      <Box x={102} tag="B-1" name="Blend tank" />
      <Box x={288} tag="C-2" name="Crystalliser" />
    </svg>
  )
}
