'use client'

import { type FormEvent, useState } from 'react'
import { Button } from '@/components/ui/button'
import { Dialog, DialogActions } from '@/components/ui/dialog'
import { ErrorSummary, type FormProblem } from '@/components/ui/error-summary'
import { Field, Input } from '@/components/ui/field'
import { Select } from '@/components/ui/select'
import { useAction } from '@/components/ui/use-action'
import { type Basis, FlowUnitSelect } from './flow-unit-select'
import { StartChoice } from './start-choice'
import { starters } from './starters'
import type { BooksActions, NewBook, ProjectRow, StarterId } from './types'

type NewBookDialogProps = {
  projects: readonly ProjectRow[]
  /** The project to begin with. */
  projectId: string | undefined
  /** What the team has chosen for new books. */
  flowUnits: Record<Basis, string>
  createBook: BooksActions['createBook']
  onDone: (book: { id: string }) => void
  onClose: () => void
}

/** Asks what a new book starts from, its name and place. Mount it to open it. */
export function NewBookDialog({ projects, projectId, flowUnits, createBook, onDone, onClose }: NewBookDialogProps) {
  const { run, isBusy, refusal } = useAction({ quiet: true })
  const [start, setStart] = useState<'blank' | StarterId>('blank')
  const [basis, setBasis] = useState<Basis>('mass')
  const [name, setName] = useState('')
  const [problems, setProblems] = useState<FormProblem[]>([])
  const starter = starters.find(({ id }) => id === start)

  const submit = (event: FormEvent<HTMLFormElement>) => {
    event.preventDefault()
    if (isBusy) return
    const data = new FormData(event.currentTarget)
    const wanted = name.trim() || starter?.name || ''
    const found: FormProblem[] = wanted === '' ? [{ field: 'book-name', text: 'Type a name for the book.' }] : []
    setProblems(found)
    if (found.length > 0) return
    const from: NewBook['from'] = starter
      ? { kind: 'starter', starter: starter.id }
      : { kind: 'blank', basis, flowUnit: String(data.get('flowUnit')) }
    run(
      () => createBook({ projectId: String(data.get('project')), name: wanted, from }),
      (book) => {
        onClose()
        onDone(book)
      },
    )
  }

  const summary: FormProblem[] = refusal ? [{ text: refusal }] : problems
  return (
    <Dialog
      open
      onOpenChange={(open) => !open && onClose()}
      title="New book"
      description="A book is one process section: its components, streams, units, connections and what is known of them."
    >
      <form onSubmit={submit} noValidate className="grid gap-4">
        <ErrorSummary problems={summary} title={refusal ? 'No book was made' : undefined} />
        <StartChoice value={start} onChange={setStart} />
        <Field
          id="book-name"
          label="Name"
          hint={starter ? undefined : 'The section, as your reports call it: “Salt section”.'}
          error={problems.find((problem) => problem.field === 'book-name')?.text}
        >
          {(field) => (
            <Input
              {...field}
              value={name}
              placeholder={starter?.name}
              onChange={(event) => setName(event.currentTarget.value)}
              maxLength={200}
              autoComplete="off"
            />
          )}
        </Field>
        <Field label="Project">
          {(field) => (
            <Select {...field} name="project" defaultValue={projectId ?? projects[0]?.id}>
              {projects.map((project) => (
                <option key={project.id} value={project.id}>
                  {project.name}
                </option>
              ))}
            </Select>
          )}
        </Field>
        {starter ? null : (
          <div className="grid gap-4 sm:grid-cols-2">
            <Field label="Basis" hint="Kept for good once values are typed.">
              {(field) => (
                <Select {...field} value={basis} onChange={(event) => setBasis(event.currentTarget.value as Basis)}>
                  <option value="mass">Mass</option>
                  <option value="mole">Moles</option>
                </Select>
              )}
            </Field>
            <Field label="Flow unit" hint="Values in other units are understood too.">
              {(field) => (
                <FlowUnitSelect {...field} key={basis} name="flowUnit" basis={basis} defaultValue={flowUnits[basis]} />
              )}
            </Field>
          </div>
        )}
        <DialogActions>
          <Button onClick={onClose}>Cancel</Button>
          <Button type="submit" look="main" busy={isBusy}>
            Make the book
          </Button>
        </DialogActions>
      </form>
    </Dialog>
  )
}
