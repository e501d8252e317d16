'use client'

import { Check, CloudOff, LoaderCircle, Lock, TriangleAlert } from 'lucide-react'
import Link from 'next/link'
import { usePathname } from 'next/navigation'
import type { ReactNode } from 'react'
import { Button, buttonClasses } from '@/components/ui/button'
import type { SaveStatus } from '@/hooks/book-handle'
import type { ChangeConflict } from '@/lib/book/change'
import { conflictText } from '@/lib/book/conflict-text'
import { counted } from '@/lib/book/edits/draft'
import type { BookState } from '@/lib/book/state'

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
    case 'ended':
      return (
        <Line icon={<Lock className="size-4 text-odds-edge" />}>
          {save.why === 'signedOut' ? 'Signed out' : 'No longer open to you'}
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
export function SaveTrouble({ save, state }: { save: SaveStatus; state: BookState }) {
  if (save.status === 'ended') return <Ended save={save} />
  if (save.status === 'conflict')
    return (
      <Trouble title={`Someone else changed this first, so “${save.change.label}” is not saved yet.`}>
        <ul className="mt-1 grid gap-0.5">
          {conflictLines(state, save.conflicts).map((line) => (
            <li key={line}>{line}</li>
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

/** Who was let go, or signed out, meanwhile: what is shown stays to be read, and nothing more is edited. */
function Ended({ save }: { save: Extract<SaveStatus, { status: 'ended' }> }) {
  const pathname = usePathname()
  const [text, href] =
    save.why === 'signedOut'
      ? ['Sign in', `/sign-in?next=${encodeURIComponent(pathname)}`]
      : ['Go to your books', '/home']
  return (
    <Trouble title={save.what}>
      {save.waiting > 0 ? (
        <p>
          {counted(save.waiting, 'change')} could not be sent, and {save.waiting === 1 ? 'is' : 'are'} kept in this
          browser.
        </p>
      ) : null}
      <div className="mt-2">
        <Link href={href} prefetch={false} className={buttonClasses('plain', 'small')}>
          {text}
        </Link>
      </div>
    </Trouble>
  )
}

function Trouble({ title, children }: { title: string; children: ReactNode }) {
  return (
    <section role="alert" className="rounded-sheet border border-odds-edge bg-odds px-4 py-3 text-ink">
      <p className="font-semibold">{title}</p>
      {children}
    </section>
  )
}

const MOST = 6

/** One sentence for each thing that differs; what a number is read from speaks for the number. */
function conflictLines(state: BookState, conflicts: readonly ChangeConflict[]): string[] {
  const hasText = new Set(conflicts.flatMap((one) => (one.code === 'field' && one.field === 'text' ? [one.id] : [])))
  const told = conflicts.filter((one) => one.code !== 'field' || one.field === 'text' || !hasText.has(one.id))
  const lines = [...new Set(told.map((conflict) => conflictText(state, conflict)))]
  return lines.length > MOST ? [...lines.slice(0, MOST), `And ${lines.length - MOST} more.`] : lines
}
