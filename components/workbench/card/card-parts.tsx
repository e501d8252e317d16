import type { ReactNode } from 'react'
import { Tag, type TagTone } from '@/components/ui/tag'
import type { ReadState } from '../cell-reading'
import { stateWords } from '../cell-reading'
import { sentence } from '../words'

/** Where the card speaks about, and its large line. */
export function CardHead({ where, title, unit }: { where: string; title: string; unit?: string }) {
  return (
    <div>
      <p className="text-sm text-ink-2">{where}</p>
      <p className="mt-0.5 font-heading text-[29px] leading-[1.15] font-semibold [overflow-wrap:anywhere]">
        {title} {unit ? <small className="text-[15px] font-normal text-ink-2">{unit}</small> : null}
      </p>
    </div>
  )
}

export function CardSection({ title, children }: { title: string; children: ReactNode }) {
  return (
    <section className="mt-4">
      <h2 className="mb-1 text-sm text-ink-2">{title}</h2>
      {children}
    </section>
  )
}

const tones: Record<ReadState, TagTone> = {
  given: 'given',
  solvable: 'solvable',
  unknown: 'unknown',
  atOdds: 'atOdds',
  absent: 'absent',
  wrong: 'atOdds',
  missing: 'absent',
}

export const StateTag = ({ state }: { state: ReadState }) => (
  <Tag tone={tones[state]}>{sentence(stateWords[state])}</Tag>
)
