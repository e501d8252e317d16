import { render, screen, waitFor } from '@testing-library/react'
import userEvent from '@testing-library/user-event'
import { beforeEach, describe, expect, it, vi } from 'vitest'
import { initials, PersonMenu } from './person-menu'

const signOut = vi.hoisted(() => vi.fn())
const push = vi.hoisted(() => vi.fn())
vi.mock('@/lib/auth/client', () => ({ authClient: { signOut } }))
vi.mock('next/navigation', () => ({ useRouter: () => ({ push }) }))

const createTeam = vi.fn()
const leaveTeam = vi.fn()
const assign = vi.fn()
beforeEach(() => {
  vi.clearAllMocks()
  vi.spyOn(window.location, 'assign').mockImplementation(assign)
})

const fennholt = { slug: 'fennholt', name: 'Fennholt' }
async function open(teams = [fennholt]) {
  const person = { name: 'Ada Lovelace', email: 'ada@fennholt.example' }
  render(
    <PersonMenu
      team={{ ...fennholt, role: 'checker' }}
      teams={teams}
      person={person}
      actions={{ createTeam, leaveTeam }}
    />,
  )
  const user = userEvent.setup()
  await user.tab()
  expect(screen.getByRole('button', { name: 'Ada Lovelace, checker of Fennholt' })).toHaveFocus()
  await user.keyboard('{Enter}')
  return user
}

describe('PersonMenu', () => {
  it('signs out by keyboard and leaves the page', async () => {
    signOut.mockResolvedValue({ data: {}, error: null })
    const user = await open()
    await user.keyboard('{End}')
    expect(screen.getByRole('menuitem', { name: 'Sign out' })).toHaveFocus()
    await user.keyboard('{Enter}')
    await waitFor(() => expect(assign).toHaveBeenCalledWith('/sign-in'))
  })

  it('stays when the server does not answer', async () => {
    signOut.mockRejectedValue(new TypeError('fetch failed'))
    const user = await open()
    await user.click(screen.getByRole('menuitem', { name: 'Sign out' }))
    await waitFor(() => expect(signOut).toHaveBeenCalled())
    expect(assign).not.toHaveBeenCalled()
  })

  it('offers other teams only to whom has them', async () => {
    const user = await open([fennholt, { slug: 'lindale', name: 'Lindale' }])
    expect(screen.getByRole('menuitemradio', { name: 'Fennholt' })).toBeChecked()
    await user.click(screen.getByRole('menuitemradio', { name: 'Lindale' }))
    expect(push).toHaveBeenCalledWith('/lindale/books')
  })

  it('shows no choice of team to whom has one', async () => {
    await open()
    expect(screen.queryByRole('menuitemradio', { name: 'Fennholt' })).toBeNull()
    expect(screen.getByRole('menuitemradio', { name: 'Dark' })).toBeInTheDocument()
  })
})

describe('teams from the menu', () => {
  it('makes another one and goes there', async () => {
    createTeam.mockResolvedValue({ ok: true, value: { slug: 'second-yard' } })
    const user = await open()
    await user.click(screen.getByRole('menuitem', { name: 'New team…' }))
    await user.type(screen.getByLabelText('Name'), 'Second yard{Enter}')
    expect(createTeam).toHaveBeenCalledWith({ name: 'Second yard' })
    await waitFor(() => expect(assign).toHaveBeenCalledWith('/second-yard/books'))
  })

  it('asks before one leaves, and tells in the question why one cannot', async () => {
    const message = 'A team needs an owner who can sign in to it. Make somebody else an owner first.'
    leaveTeam.mockResolvedValueOnce({ ok: false, error: { code: 'conflict', message } })
    const user = await open()
    await user.click(screen.getByRole('menuitem', { name: 'Leave this team…' }))
    expect(leaveTeam).not.toHaveBeenCalled()
    await user.click(screen.getByRole('button', { name: 'Leave the team' }))
    expect(await screen.findByText(message)).toBeVisible()
    expect(assign).not.toHaveBeenCalled()
    leaveTeam.mockResolvedValueOnce({ ok: true, value: undefined })
    await user.click(screen.getByRole('button', { name: 'Leave the team' }))
    await waitFor(() => expect(assign).toHaveBeenCalledWith('/home'))
  })
})

describe('initials', () => {
  it.each([
    ['Ada Lovelace', 'AL'],
    ['  ada  king  lovelace ', 'AL'],
    ['Plato', 'P'],
    ['Åsa Öberg', 'ÅÖ'],
  ])('%s', (name, letters) => {
    expect(initials(name)).toBe(letters)
  })
})
