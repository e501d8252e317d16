'use client'

import { type FormEvent, useState } from 'react'
import { Button } from '@/components/ui/button'
import { Dialog, DialogActions } from '@/components/ui/dialog'
import { ErrorSummary, type FormProblem } from '@/components/ui/error-summary'
import { Field, TextArea } from '@/components/ui/field'
import { refusalSentence } from '@/components/ui/use-action'
import { type Role, seesEveryProject } from '@/lib/auth/permissions'
import { addressesIn, addressesProblem } from './addresses'
import { ProjectChecks } from './project-checks'
import { RoleChoice } from './role-choice'
import type { MembersActions, ProjectChoice } from './types'

type InviteDialogProps = {
  projects: readonly ProjectChoice[]
  inviteMember: MembersActions['inviteMember']
  onInvited: (addresses: string[]) => void
  onClose: () => void
}

const lost = 'the server did not answer, so it is not known whether it was sent. Look at the list.'

/** Invites one or several people to one role. Those that are refused stay in the box, each with its reason. */
export function InviteDialog({ projects, inviteMember, onInvited, onClose }: InviteDialogProps) {
  const [text, setText] = useState('')
  const [role, setRole] = useState<Role>('engineer')
  const [chosen, setChosen] = useState<string[]>(projects.length === 1 ? projects.map(({ id }) => id) : [])
  const [problems, setProblems] = useState<FormProblem[]>([])
  const [sending, setSending] = useState<{ done: number; of: number } | null>(null)
  const needsProjects = !seesEveryProject(role)

  const invite = async (addresses: string[]) => {
    const refused: { email: string; why: string }[] = []
    for (const [done, email] of addresses.entries()) {
      setSending({ done, of: addresses.length })
      const result = await inviteMember({ email, role, projects: needsProjects ? chosen : [] }).catch(() => null)
      if (result === null) refused.push({ email, why: `${email}: ${lost}` })
      else if (!result.ok) {
        const words = { email: email, projects: 'The invitation' }
        refused.push({ email, why: refusalSentence(result.error, words) })
      }
    }
    setSending(null)
    const sent = addresses.filter((address) => refused.every(({ email }) => email !== address))
    if (sent.length > 0) onInvited(sent)
    if (refused.length === 0) return onClose()
    setText(refused.map(({ email }) => email).join('\n'))
    setProblems(refused.map(({ why }) => ({ field: 'addresses', text: why })))
  }

  const submit = (event: FormEvent<HTMLFormElement>) => {
    event.preventDefault()
    if (sending) return
    const addresses = addressesIn(text)
    const found: FormProblem[] = []
    const wrong = addressesProblem(addresses)
    if (wrong) found.push({ field: 'addresses', text: wrong })
    if (needsProjects && chosen.length === 0)
      found.push({ field: 'projects', text: 'Choose at least one project: this role sees no others.' })
    setProblems(found)
    if (found.length === 0) void invite(addresses)
  }

  const about = (field: string) => problems.filter((problem) => problem.field === field)
  return (
    <Dialog
      open
      onOpenChange={(open) => !open && onClose()}
      title="Invite people"
      description="Each gets a mail with a link of their own, which is good for seven days."
    >
      <form onSubmit={submit} noValidate className="grid gap-4">
        <ErrorSummary problems={problems} title={about('addresses').length > 1 ? 'Not invited' : undefined} />
        <Field
          id="addresses"
          label="E-mail addresses"
          hint="One or several, each on a line of its own or parted by commas."
          error={about('addresses').length === 1 ? about('addresses')[0]?.text : undefined}
        >
          {(field) => (
            <TextArea
              {...field}
              value={text}
              onChange={(event) => setText(event.currentTarget.value)}
              rows={3}
              inputMode="email"
              autoCapitalize="none"
              autoComplete="off"
              spellCheck={false}
            />
          )}
        </Field>
        <RoleChoice value={role} onChange={setRole} />
        {needsProjects ? (
          <ProjectChecks
            id="projects"
            projects={projects}
            chosen={chosen}
            onChange={setChosen}
            error={about('projects')[0]?.text}
          />
        ) : null}
        <DialogActions>
          <Button onClick={onClose}>Cancel</Button>
          <Button type="submit" look="main" busy={sending !== null}>
            {sending && sending.of > 1 ? `Inviting ${sending.done + 1} of ${sending.of}` : 'Invite'}
          </Button>
        </DialogActions>
      </form>
    </Dialog>
  )
}
