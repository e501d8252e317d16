import { render, screen, waitFor } from '@testing-library/react'
import userEvent from '@testing-library/user-event'
import { beforeEach, expect, it, vi } from 'vitest'
import type { InvitationLook } from '@/lib/data/invitation/look-invitation'
import { fail, ok } from '@/lib/errors'
import { InvitationSheet } from './invitation-sheet'

const { signIn, signOut } = vi.hoisted(() => ({ signIn: vi.fn(), signOut: vi.fn() }))
vi.mock('@/lib/auth/client', () => ({ authClient: { signIn: { email: signIn }, signOut } }))
const actions = { acceptInvitation: vi.fn(), signUpAndAccept: vi.fn() }
const [assign, reload] = [vi.fn(), vi.fn()]
beforeEach(() => {
  vi.resetAllMocks()
  vi.spyOn(window.location, 'assign').mockImplementation(assign)
  vi.spyOn(window.location, 'reload').mockImplementation(reload)
})

const look: InvitationLook = {
  team: 'Fennholt',
  inviter: 'Ada',
  role: 'analyst',
  projects: ['Salt', 'Whey'],
  email: 'eve@fennholt.example',
  expiresAt: new Date('2026-03-09T10:00:00Z'),
  hasAccount: false,
  you: { kind: 'nobody' },
}
function show(more: Partial<InvitationLook>) {
  render(<InvitationSheet look={{ ...look, ...more }} token="t0ken" actions={actions} />)
  return userEvent.setup()
}

it('tells as what one is asked in, to which projects and until when', () => {
  show({})
  expect(screen.getByText('an analyst')).toBeVisible()
  expect(screen.getByText('Salt and Whey')).toBeVisible()
  expect(screen.getByText('9 March 2026')).toBeVisible()
})

it('makes an account with the invited address, joins and signs in', async () => {
  actions.signUpAndAccept.mockResolvedValue(ok({ team: 'fennholt', email: look.email }))
  signIn.mockResolvedValue({ data: {}, error: null })
  const user = show({})
  expect(screen.getByLabelText('E-mail')).toHaveValue(look.email)
  expect(screen.getByLabelText('E-mail')).toHaveAttribute('readonly')
  await user.click(screen.getByRole('button', { name: 'Make an account and join' }))
  expect(screen.getByLabelText('Your name')).toBeInvalid()
  expect(actions.signUpAndAccept).not.toHaveBeenCalled()
  await user.type(screen.getByLabelText('Your name'), 'Eve')
  await user.type(screen.getByLabelText('Password'), 'three plain words{Enter}')
  expect(actions.signUpAndAccept).toHaveBeenCalledWith({ token: 't0ken', name: 'Eve', password: 'three plain words' })
  await waitFor(() => expect(assign).toHaveBeenCalledWith('/fennholt/books'))
  expect(signIn).toHaveBeenCalledWith({ email: look.email, password: 'three plain words' })
})

it('leads to signing in where that fails after joining: the account is made', async () => {
  actions.signUpAndAccept.mockResolvedValue(ok({ team: 'fennholt', email: look.email }))
  signIn.mockRejectedValue(new TypeError('fetch failed'))
  const user = show({})
  await user.type(screen.getByLabelText('Your name'), 'Eve')
  await user.type(screen.getByLabelText('Password'), 'three plain words{Enter}')
  await waitFor(() => expect(assign).toHaveBeenCalledWith('/sign-in?next=%2Ffennholt%2Fbooks'))
})

it('sends who has an account to sign in, and back to this invitation', () => {
  show({ hasAccount: true })
  expect(screen.getByRole('link', { name: 'Sign in to accept' })).toHaveAttribute(
    'href',
    '/sign-in?next=%2Finvitation%3Ftoken%3Dt0ken',
  )
})

it('lets the invited person in at one press, or says why not', async () => {
  actions.acceptInvitation.mockResolvedValueOnce(fail('notAllowed', 'Your membership in this team was deactivated.'))
  const user = show({ hasAccount: true, you: { kind: 'invited' } })
  await user.click(screen.getByRole('button', { name: 'Join Fennholt' }))
  expect(await screen.findByText('Your membership in this team was deactivated.')).toBeVisible()
  actions.acceptInvitation.mockResolvedValueOnce(ok({ team: 'fennholt' }))
  await user.click(screen.getByRole('button', { name: 'Join Fennholt' }))
  expect(actions.acceptInvitation).toHaveBeenLastCalledWith({ token: 't0ken' })
  await waitFor(() => expect(assign).toHaveBeenCalledWith('/fennholt/books'))
})

it('says plainly that another account is signed in, with a way out', async () => {
  signOut.mockResolvedValue({ data: {}, error: null })
  const user = show({ hasAccount: true, you: { kind: 'somebodyElse', email: 'mo@other.example' } })
  expect(screen.getAllByText('mo@other.example')[0]).toBeVisible()
  expect(screen.queryByRole('button', { name: /Join/ })).toBeNull()
  await user.click(screen.getByRole('button', { name: 'Sign out and go on' }))
  await waitFor(() => expect(reload).toHaveBeenCalled())
})
