import { render, screen, within } from '@testing-library/react'
import userEvent from '@testing-library/user-event'
import { describe, expect, it, vi } from 'vitest'
import { solvedCase } from '@/hooks/solver-handle'
import { type Problem, type Solution, solve } from '@/lib/balance'
import { CellFlag, slotOf } from '@/lib/balance/solution'
import { fromProblem } from '@/lib/book/from-problem'
import { inOrder, stateOf } from '@/lib/book/state'
import { toProblem } from '@/lib/book/to-problem'
import { bookView } from './book-view'
import { CellCard } from './card/cell-card'
import type { Desk } from './desk'
import { ChecksPanel } from './odds/checks-panel'
import { valueRow } from './rows'
import { stripWords } from './strip-words'

const tank: Problem = {
  format: 'tallybrook/1',
  name: 'Tank',
  basis: 'mass',
  flowUnit: 'kg/h',
  components: [{ id: 'A' }, { id: 'B' }],
  streams: [{ id: '1' }, { id: '2' }, { id: '3' }],
  units: [{ id: 'U', kind: 'mixer' }],
  links: { U: { '1': 'in', '2': 'in', '3': 'out' } },
  givens: [{ stream: '1', quantity: 'flow', value: 100, halfWidth: 0.5 }],
}

/** A desk that edits nothing and remembers what it was asked to open. */
function deskOf() {
  const openPanel = vi.fn<Desk['openPanel']>()
  const show = vi.fn<Desk['show']>()
  const desk = { openPanel, show, run: () => null, tryRun: () => true } as unknown as Desk
  return { desk, openPanel, show }
}

/** The view of a problem; `also` puts into the answer what is looked at here alone. */
function viewOf(problem: Partial<Problem>, also: (solution: Solution) => Partial<Solution> = () => ({})) {
  let next = 0
  const state = stateOf(fromProblem({ ...tank, ...problem }, () => `tank-${++next}`))
  const caseId = inOrder(state.case)[0]?.id ?? ''
  const { problem: asked, wanted, ...rest } = toProblem(state, caseId)
  const solution = solve(asked, wanted)
  const view = bookView(
    state,
    caseId,
    solvedCase({ ...rest, solution: { ...solution, ...also(solution) } }),
    true,
    'point',
  )
  const id = (kind: 'stream' | 'component', tag: string) =>
    [...state[kind].values()].find((record) => record.tag === tag)?.id ?? ''
  return { view, id }
}

function openCard({ view, id }: ReturnType<typeof viewOf>, stream: string, component?: string) {
  const told = deskOf()
  const row = component ? valueRow('componentFlow', id('component', component)) : valueRow('flow')
  render(<CellCard view={view} desk={told.desk} pane="table" place={{ row, column: id('stream', stream) }} />)
  return told
}

describe('what the card says of a cell', () => {
  it('lists its values where several solutions fit, and the strip counts them', () => {
    const shown = viewOf({ relations: [{ id: 'Q1', kind: 'formula', text: 'part("1", "A") * part("1", "B") = 2100' }] })
    expect(shown.view.solved?.solution.roots?.cells.length).toBeGreaterThan(0)
    openCard(shown, '1', 'A')
    const values = within(screen.getByRole('list', { name: 'Values in the solutions' })).getAllByRole('listitem')
    expect(values.map(({ textContent }) => textContent)).toEqual(['30.00 kg/h', '70.00 kg/h'])
    expect(stripWords(shown.view, null).rest).toContain('2 solutions fit what is given')
  })

  it('says which conflict holds it back, and leads there', async () => {
    const fractions = ['A', 'B'].map(
      (component) => ({ stream: '1', quantity: 'massFraction', component, value: 0.6 }) as const,
    )
    const { openPanel } = openCard(viewOf({ givens: [...(tank.givens ?? []), ...fractions] }), '1', 'A')
    expect(
      screen.getByText(/Held back by conflict 1: it would follow from values that are at odds/),
    ).toBeInTheDocument()
    await userEvent.click(screen.getByRole('button', { name: 'See what is at odds' }))
    expect(openPanel).toHaveBeenCalledWith('odds')
  })

  it('says that a result is negative', () => {
    const flows = [{ stream: '3', quantity: 'flow', value: 40 } as const]
    openCard(viewOf({ givens: [...(tank.givens ?? []), ...flows] }), '2')
    expect(screen.getByText(/The result is negative/)).toBeInTheDocument()
  })

  it('says how much an error grows on its way, and that a search is no proof', () => {
    const slot = slotOf(2, 2, 'flow')
    openCard(
      viewOf({ givens: [...(tank.givens ?? []), { stream: '2', quantity: 'flow', value: 50 }] }, ({ flags }) => {
        flags[slot] = CellFlag.amplified | CellFlag.localOnly
        return { amplification: [[slot, 23_456]] }
      }),
      '3',
    )
    expect(screen.getByText(/comes out about 23\s000 times as large here/)).toBeInTheDocument()
    expect(screen.getByText(/not proved/)).toBeInTheDocument()
  })

  it('says how finely a value was typed', () => {
    openCard(viewOf({}), '1')
    expect(screen.getByRole('textbox', { name: 'Half-width of its rounding, kg/h' })).toHaveValue('0.5')
  })
})

describe('checks', () => {
  const place = { stream: '1', quantity: 'flow' } as const
  const checks: Solution['checks'] = [
    {
      code: 'redundant',
      givens: [{ stream: '3', quantity: 'flow' }],
      relations: [],
      by: 0.2,
      tolerance: 0.5,
      agrees: true,
    },
    { code: 'checkOnly', givens: [place], relations: [], by: -12.5, tolerance: 0.5, agrees: false },
    {
      code: 'sum',
      givens: [{ stream: '2', quantity: 'massFraction', component: 'A' }],
      relations: [],
      by: 0.0004,
      tolerance: 0.0005,
      agrees: true,
    },
    { code: 'redundant', givens: [], relations: ['Q1'], by: 1, tolerance: 2, agrees: true },
  ]
  const said = (text: string | null) => (text ?? '').replace(/\s/g, ' ')

  it('are listed, what disagrees first, and lead to their places', async () => {
    const { view, id } = viewOf({}, () => ({ checks }))
    const { desk, show } = deskOf()
    render(<ChecksPanel view={view} desk={desk} />)
    const lines = screen.getAllByRole('listitem').map(({ textContent }) => said(textContent))
    expect(lines[0]).toBe(
      'Total flow of 1, kept as a check only: does not agree, off by −12.50 kg/h, allowed ± 0.50 kg/h.Total flow of 1',
    )
    expect(lines[1]).toContain('Total flow of 3 also follows from the rest: agrees, off by +0.20 kg/h')
    expect(lines[2]).toContain('The typed fractions of stream 2 add up to 1: agrees, off by +0.040 wt %')
    expect(lines[3]).toContain('Rule Q1 also follows from the rest: agrees, off by +1.00')
    await userEvent.click(screen.getByRole('button', { name: 'Total flow of 3' }))
    expect(show).toHaveBeenCalledWith('table', { row: valueRow('flow'), column: id('stream', '3') })
  })

  it('stand on the card of the cell that they are of, and of no other', () => {
    openCard(
      viewOf({}, () => ({ checks })),
      '1',
    )
    const section = screen.getByRole('heading', { name: 'Checks' }).parentElement
    expect(said(section?.textContent ?? '')).toContain('kept as a check only: does not agree')
    expect(section?.textContent).not.toContain('add up')
  })

  it('are told to be none where nothing is checked', () => {
    render(<ChecksPanel view={viewOf({}, () => ({ checks: [] })).view} desk={deskOf().desk} />)
    expect(screen.getByText(/Nothing to check yet/)).toBeInTheDocument()
  })
})
