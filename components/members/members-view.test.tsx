import { render, screen, within } from '@testing-library/react'
import userEvent from '@testing-library/user-event'
import { beforeEach, describe, expect, it, vi } from 'vitest'
import { fail, ok } from '@/lib/errors'
import { MembersView } from './members-view'
import type { InvitationRow, MemberRow } from './types'

const actions = {
  inviteMember: vi.fn(),
  resendInvitation: vi.fn(),
  revokeInvitation: vi.fn(),
  changeRole: vi.fn(),
  setMemberProjects: vi.fn(),
  deactivateMember: vi.fn(),
  reactivateMember: vi.fn(),
  removeMember: vi.fn(),
  leaveTeam: vi.fn(),
}
beforeEach(() => {
  vi.resetAllMocks()
  for (const action of Object.values(actions)) action.mockResolvedValue(ok(undefined))
})

const since = new Date('2026-03-02T10:00:00Z')
const person = (name: string, more: Partial<MemberRow>): MemberRow => ({
  userId: name.toLowerCase(),
  name,
  email: `${name.toLowerCase()}@fennholt.example`,
  role: 'engineer',
  state: 'active',
  projects: 'all',
  hasSecondFactor: false,
  joinedAt: since,
  deactivatedAt: null,
  isYou: false,
  isLastOwner: false,
  ...more,
})
const salt = { id: 'salt', name: 'Salt' }
const whey = { id: 'whey', name: 'Whey' }
const members = [
  person('Ada', { role: 'owner', isYou: true, isLastOwner: true }),
  person('Ben', { role: 'engineer' }),
  person('Cleo', { role: 'analyst', projects: [salt] }),
  person('Dov', { role: 'reader', projects: [], state: 'deactivated', deactivatedAt: since }),
]
const invitation: InvitationRow = {
  id: 'i1',
  email: 'eve@fennholt.example',
  role: 'reader',
  projects: [salt],
  inviter: 'Ada',
  sentAt: since,
  expiresAt: new Date('2026-03-09T10:00:00Z'),
  hasExpired: true,
}

function show(more: { invitations?: InvitationRow[] | null; mayChange?: boolean } = {}) {
  render(
    <MembersView
      teamName="Fennholt"
      members={members}
      projects={[salt, whey]}
      invitations={more.invitations === undefined ? [invitation] : more.invitations}
      mayChange={more.mayChange ?? true}
      actions={actions}
    />,
  )
  return userEvent.setup()
}

const rowOf = (name: RegExp) => {
  const row = screen.getByRole('rowheader', { name }).closest('tr')
  if (!row) throw new Error(`no row of ${name}`)
  return within(row)
}
const dialog = () => within(screen.getByRole('dialog'))

describe('the people of a team', () => {
  it('are listed with role, projects and state', () => {
    show()
    expect(rowOf(/Ada \(you\)/).getByText('Every project')).toBeInTheDocument()
    expect(rowOf(/Cleo/).getByText('Salt')).toBeInTheDocument()
    expect(rowOf(/Dov/).getByText('Deactivated')).toBeInTheDocument()
    expect(rowOf(/Ben/).getByText(/2 March 2026/)).toBeInTheDocument()
  })

  it('are only read by others than owners', () => {
    show({ invitations: null, mayChange: false })
    expect(screen.queryByRole('combobox')).toBeNull()
    expect(screen.queryByRole('button')).toBeNull()
    expect(screen.queryByRole('heading', { name: 'Invited' })).toBeNull()
    expect(rowOf(/Ben/).getByText('Engineer')).toBeInTheDocument()
  })
})

describe('a role', () => {
  it('that takes nothing away is given at once', async () => {
    const user = show()
    await user.selectOptions(screen.getByLabelText('Role of Cleo'), 'engineer')
    expect(screen.queryByRole('dialog')).toBeNull()
    expect(actions.changeRole).toHaveBeenCalledWith({ user: 'cleo', role: 'engineer' })
  })

  it('that takes rights away is asked about first, in words', async () => {
    const user = show()
    await user.selectOptions(screen.getByLabelText('Role of Ben'), 'checker')
    expect(actions.changeRole).not.toHaveBeenCalled()
    expect(dialog().getByText(/From then on Ben cannot edit books any more/)).toBeVisible()
    await user.click(dialog().getByRole('button', { name: 'Cancel' }))
    expect(actions.changeRole).not.toHaveBeenCalled()
    expect(screen.getByLabelText('Role of Ben')).toHaveValue('engineer')
  })

  it('that sees chosen projects only asks for them', async () => {
    const user = show()
    await user.selectOptions(screen.getByLabelText('Role of Ben'), 'reader')
    await user.click(dialog().getByRole('checkbox', { name: 'Whey' }))
    await user.click(dialog().getByRole('button', { name: 'Change the role' }))
    expect(actions.changeRole).toHaveBeenCalledWith({ user: 'ben', role: 'reader', projects: ['whey'] })
  })

  it('of owner is never handed over without asking', async () => {
    const user = show()
    await user.selectOptions(screen.getByLabelText('Role of Ben'), 'owner')
    expect(actions.changeRole).not.toHaveBeenCalled()
    expect(dialog().getByText(/take the role of owner from you/)).toBeVisible()
  })

  it('of the last owner stays, and the reason is told in the question', async () => {
    actions.changeRole.mockResolvedValue(fail('conflict', 'A team needs an owner who can sign in to it.'))
    const user = show()
    await user.selectOptions(screen.getByLabelText('Role of Ada'), 'engineer')
    await user.click(dialog().getByRole('button', { name: 'Change the role' }))
    expect(await dialog().findByText('A team needs an owner who can sign in to it.')).toBeVisible()
    expect(screen.getByLabelText('Role of Ada')).toHaveValue('owner')
  })
})

describe('somebody of the team', () => {
  it.each([
    ['Ben', 'Deactivate…', 'Deactivate', actions.deactivateMember],
    ['Dov', 'Reactivate…', 'Reactivate', actions.reactivateMember],
    ['Ben', 'Remove from the team…', 'Remove', actions.removeMember],
  ])('%s: %s is asked, then done', async (name, item, verb, action) => {
    const user = show()
    await user.click(screen.getByRole('button', { name: `Actions for ${name}` }))
    await user.click(screen.getByRole('menuitem', { name: item }))
    expect(action).not.toHaveBeenCalled()
    await user.click(dialog().getByRole('button', { name: verb }))
    expect(action).toHaveBeenCalledWith({ user: name.toLowerCase() })
  })

  it('gets other projects', async () => {
    const user = show()
    await user.click(screen.getByRole('button', { name: 'Actions for Cleo' }))
    await user.click(screen.getByRole('menuitem', { name: 'Choose projects…' }))
    expect(dialog().getByRole('checkbox', { name: 'Salt' })).toBeChecked()
    await user.click(dialog().getByRole('checkbox', { name: 'Salt' }))
    await user.click(dialog().getByRole('checkbox', { name: 'Whey' }))
    await user.click(dialog().getByRole('button', { name: 'Keep this' }))
    expect(actions.setMemberProjects).toHaveBeenCalledWith({ user: 'cleo', projects: ['whey'] })
  })
})

describe('inviting', () => {
  const begin = async () => {
    const user = show()
    await user.click(screen.getByRole('button', { name: 'Invite people' }))
    return user
  }
  const send = (user: ReturnType<typeof userEvent.setup>) =>
    user.click(dialog().getByRole('button', { name: 'Invite' }))

  it('invites each address of a list once, to one role', async () => {
    const user = await begin()
    await user.type(
      dialog().getByLabelText('E-mail addresses'),
      'fay@x.example, Gil <gil@x.example>{Enter}FAY@x.example',
    )
    await user.click(dialog().getByRole('radio', { name: /^Checker/ }))
    await send(user)
    expect(actions.inviteMember.mock.calls.map(([input]) => input)).toEqual([
      { email: 'fay@x.example', role: 'checker', projects: [] },
      { email: 'gil@x.example', role: 'checker', projects: [] },
    ])
    expect(screen.queryByRole('dialog')).toBeNull()
  })

  it('asks an analyst’s inviter for a project, and refuses what is no address', async () => {
    const user = await begin()
    await user.type(dialog().getByLabelText('E-mail addresses'), 'fay@')
    await user.click(dialog().getByRole('radio', { name: /^Analyst/ }))
    await send(user)
    expect(dialog().getByRole('alert')).toHaveTextContent('fay@ is not an e-mail address')
    expect(dialog().getByRole('alert')).toHaveTextContent('Choose at least one project')
    expect(actions.inviteMember).not.toHaveBeenCalled()
  })

  it('keeps those that were refused in the box, each with its reason', async () => {
    actions.inviteMember.mockResolvedValueOnce(ok({ id: 'x' }))
    actions.inviteMember.mockResolvedValueOnce(fail('conflict', 'Gil (gil@x.example) is in this team already.'))
    const user = await begin()
    await user.type(dialog().getByLabelText('E-mail addresses'), 'fay@x.example gil@x.example')
    await send(user)
    expect((await dialog().findAllByText('Gil (gil@x.example) is in this team already.'))[0]).toBeVisible()
    expect(dialog().getByLabelText('E-mail addresses')).toHaveValue('gil@x.example')
  })

  it('shows open invitations, sends one again and withdraws one after asking', async () => {
    const user = show()
    const list = within(screen.getByRole('list', { name: 'Open invitations' }))
    expect(list.getByText('Has run out')).toBeInTheDocument()
    expect(list.getByText('Reader, Salt')).toBeInTheDocument()
    await user.click(list.getByRole('button', { name: /Send again: the invitation of eve/ }))
    expect(actions.resendInvitation).toHaveBeenCalledWith({ invitation: 'i1' })
    await user.click(list.getByRole('button', { name: /Withdraw the invitation/ }))
    expect(actions.revokeInvitation).not.toHaveBeenCalled()
    await user.click(dialog().getByRole('button', { name: 'Withdraw' }))
    expect(actions.revokeInvitation).toHaveBeenCalledWith({ invitation: 'i1' })
  })
})
