'use client'

import { useState } from 'react'
import { Button } from '@/components/ui/button'
import { setUse, type Use } from '@/lib/book/edits/ways-out'
import { newId } from '@/lib/book/ids'
import { plainNumber } from '@/lib/sheet/format'
import type { BookView } from '../book-view'
import type { Desk } from '../desk'
import { lowered } from '../words'
import type { OddsMember } from './odds-sets'
import { SigmaInput } from './sigma-input'

type MemberWaysProps = {
  view: BookView
  desk: Desk
  member: OddsMember
  /** Called once a way was taken: the button that was pressed is gone by then. */
  onDone: () => void
}

/** The three ways out for one member of a set: withdraw it, keep it as a check only, give it an uncertainty. */
export function MemberWays({ view, desk, member, onDone }: MemberWaysProps) {
  const [asking, setAsking] = useState(false)
  const { ref } = member
  if (!view.mayEdit || ref === null) return null
  const name = lowered(member.name)
  const use = (to: Use) => {
    if (desk.tryRun(setUse(view.state, ref, to, newId))) onDone()
  }
  const given = ref.kind === 'given' ? view.state.given.get(ref.id) : undefined
  const sigma = given?.sigma == null ? undefined : `± ${plainNumber(given.sigma, view.decimal)} …`
  return (
    <div className="grid gap-1.5">
      <div className="flex flex-wrap gap-1.5">
        <Button size="small" aria-label={`Withdraw ${name}`} onClick={() => use('withdrawn')}>
          Withdraw
        </Button>
        <Button size="small" aria-label={`Keep ${name} as a check only`} onClick={() => use('check')}>
          Check only
        </Button>
        {given ? (
          <Button
            size="small"
            aria-label={sigma ? `Change the uncertainty of ${name}, ${sigma}` : `Give ${name} an uncertainty`}
            aria-expanded={asking}
            onClick={() => setAsking(!asking)}
          >
            {sigma ?? 'Uncertainty…'}
          </Button>
        ) : null}
      </div>
      {given && asking ? <SigmaInput view={view} desk={desk} given={given} autoFocus /> : null}
      {given && asking ? (
        <p className="text-xs text-ink-2">
          {given.sigma === null
            ? 'A value with an uncertainty is a reading. '
            : 'It has an uncertainty, so it is a reading. '}
          It stays at odds until it is reconciled, which comes with Readings.
        </p>
      ) : null}
    </div>
  )
}
