'use client'

import { Check, CloudOff, LoaderCircle, TriangleAlert } from 'lucide-react'
import type { ReactNode } from 'react'
import { Button } from '@/components/ui/button'
import type { SaveStatus } from '@/hooks/book-handle'
import type { ChangeConflict } from '@/lib/book/change'
import { counted } from '@/lib/book/edits/draft'
import { kindNames } from '@/lib/book/kinds'

/** How far the unsent edits are, always in sight. */
export function SaveState({ save, kept }: { save: SaveStatus; kept: string }) {
  switch (save.status) {
    case 'saved':
      return <Line icon={<Check className="size-4 text-solved-edge" />}>{kept}</Line>
    case 'saving':
      return (
        <Line icon={<LoaderCircle className="size-4 animate-spin" />}>Saving {counted(save.waiting, 'change')}</Line>
      )
    case 'offline':
      return (
        <Line icon={<CloudOff className="size-4 text-given-edge" />} title={save.what}>
          Offline: {counted(save.waiting, 'change')} waiting here
        </Line>
      )
    default:
      return (
        <Line icon={<TriangleAlert className="size-4 text-odds-edge" />}>
          {save.status === 'conflict' ? 'Not saved: changed by someone else' : 'Not saved: refused'}
        </Line>
      )
  }
}

function Line({ icon, title, children }: { icon: ReactNode; title?: string; children: ReactNode }) {
  return (
    <span role="status" className="inline-flex items-center gap-1.5 text-xs text-ink-2" title={title}>
      <span aria-hidden="true">{icon}</span>
      {children}
    </span>
  )
}

/** A conflict or a refusal, with both values and what can be done. */
export function SaveTrouble({ save }: { save: SaveStatus }) {
  if (save.status === 'conflict')
    return (
      <Trouble title={`Someone else changed this first, so “${save.change.label}” is not saved yet.`}>
        <ul className="mt-1 grid gap-0.5">
          {save.conflicts.slice(0, 6).map((conflict) => (
            <li key={`${conflict.kind}/${conflict.id}/${conflict.code === 'field' ? conflict.field : ''}`}>
              {conflictWords(conflict)}
            </li>
          ))}
        </ul>
        <div className="mt-2 flex flex-wrap gap-2">
          <Button size="small" look="main" onClick={save.keepMine}>
            Keep mine
          </Button>
          <Button size="small" onClick={save.dropMine}>
            Take theirs
          </Button>
        </div>
      </Trouble>
    )
  if (save.status === 'rejected')
    return (
      <Trouble title={`“${save.change.label}” was refused and has been taken back: ${save.what}`}>
        {save.problems.length > 0 ? (
          <ul className="mt-1 list-disc ps-5">
            {save.problems.slice(0, 6).map((problem) => (
              <li key={`${problem.id}/${problem.field ?? ''}/${problem.what}`}>{problem.what}</li>
            ))}
          </ul>
        ) : null}
        <div className="mt-2">
          <Button size="small" onClick={save.dismiss}>
            I have read it
          </Button>
        </div>
      </Trouble>
    )
  return null
}

function Trouble({ title, children }: { title: string; children: ReactNode }) {
  return (
    <section role="alert" className="rounded-sheet border border-odds-edge bg-odds px-4 py-3 text-ink">
      <p className="font-semibold">{title}</p>
      {children}
    </section>
  )
}

function conflictWords(conflict: ChangeConflict): string {
  const what = kindNames[conflict.kind]
  if (conflict.code === 'gone') return `The ${what} is no longer in the book.`
  if (conflict.code === 'exists') return `There is already a ${what} at this place.`
  const show = (value: unknown) => (value === null || value === undefined || value === '' ? 'nothing' : String(value))
  return `${conflict.field} of a ${what}: you wrote ${show(conflict.mine)}, they wrote ${show(conflict.theirs)}; it was ${show(conflict.from)}.`
}
