'use client'

import type { KeyboardEvent, ReactNode } from 'react'

export type PanelKey =
  | 'connections'
  | 'boundaries'
  | 'workings'
  | 'rules'
  | 'closure'
  | 'next'
  | 'odds'
  | 'checks'
  | 'notes'

type PanelTabsProps = {
  chosen: PanelKey
  /** Left out: none to be counted. */
  counts: Partial<Record<PanelKey, number>>
  onChoose: (key: PanelKey) => void
  children?: ReactNode
}

const titles: [PanelKey, string][] = [
  ['connections', 'Connections'],
  ['boundaries', 'Boundaries'],
  ['workings', 'Workings'],
  ['rules', 'Rules'],
  ['closure', 'Closure'],
  ['next', 'What to measure next'],
  ['odds', 'At odds'],
  ['checks', 'Checks'],
  ['notes', 'Notes'],
]

/** What stands under the stream table. Arrows go along the tabs. */
export function PanelTabs({ chosen, counts, onChoose, children }: PanelTabsProps) {
  const onKeyDown = (event: KeyboardEvent) => {
    const step = event.key === 'ArrowRight' ? 1 : event.key === 'ArrowLeft' ? -1 : 0
    if (step === 0) return
    event.preventDefault()
    const index = titles.findIndex(([key]) => key === chosen)
    const next = titles[(index + step + titles.length) % titles.length]
    if (!next) return
    onChoose(next[0])
    document.getElementById(`tab-${next[0]}`)?.focus()
  }
  return (
    <div className="flex h-9.5 flex-none items-center border-b border-hair bg-rail ps-2 pe-3">
      <div
        role="tablist"
        aria-label="Under the stream table"
        className="flex h-full min-w-0 overflow-x-auto [scrollbar-width:none]"
      >
        {titles.map(([key, title]) => (
          <button
            key={key}
            id={`tab-${key}`}
            type="button"
            role="tab"
            aria-selected={key === chosen}
            aria-controls={`panel-${key}`}
            tabIndex={key === chosen ? 0 : -1}
            className="flex-none px-3 text-sm whitespace-nowrap text-ink-2 max-sm:px-2.5 aria-selected:font-semibold aria-selected:text-ink aria-selected:shadow-[inset_0_-2px_0_var(--brook)]"
            onClick={() => onChoose(key)}
            onKeyDown={onKeyDown}
          >
            {title}
            {(counts[key] ?? 0) > 0 && key !== 'connections' ? (
              <span
                className={`ms-1.5 rounded-full px-1.5 text-2xs ${key === 'odds' ? 'bg-odds text-odds-ink' : 'bg-hair text-ink-2'}`}
              >
                {counts[key]}
              </span>
            ) : null}
          </button>
        ))}
      </div>
      <span className="flex-1" />
      {children}
    </div>
  )
}

const keys: [string, string][] = [
  ['cell-given', 'given'],
  ['cell-solvable', 'solvable now'],
  ['cell-unknown', 'still unknown'],
  ['cell-at-odds', 'at odds'],
]

/** What the fills and edges mean. */
export function Legend() {
  return (
    <ul
      className="flex flex-none items-center gap-3.5 text-2xs whitespace-nowrap text-ink-2 max-lg:hidden"
      aria-label="States"
    >
      {keys.map(([className, word]) => (
        <li key={word} className="flex items-center gap-1.5">
          <span className={`cell-swatch ${className}`} aria-hidden="true" />
          {word}
        </li>
      ))}
    </ul>
  )
}
