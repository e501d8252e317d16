import { render, screen, waitFor } from '@testing-library/react'
import userEvent from '@testing-library/user-event'
import { beforeEach, describe, expect, it, vi } from 'vitest'
import { shortestPassword } from '@/lib/auth/password'
import { SignUpForm } from './sign-up-form'

const email = vi.hoisted(() => vi.fn())
vi.mock('@/lib/auth/client', () => ({ authClient: { signUp: { email } } }))

const assign = vi.fn()
beforeEach(() => {
  email.mockReset()
  assign.mockReset()
  vi.spyOn(window.location, 'assign').mockImplementation(assign)
})

async function fill(name: string, address: string, password: string) {
  const user = userEvent.setup()
  if (name) await user.type(screen.getByLabelText('Your name'), name)
  if (address) await user.type(screen.getByLabelText('Work e-mail'), address)
  if (password) await user.type(screen.getByLabelText('Password'), password)
  await user.click(screen.getByRole('button', { name: 'Make an account' }))
}

describe('SignUpForm', () => {
  it('tells the length of a password before one is typed', () => {
    render(<SignUpForm next="/home" />)
    expect(screen.getByLabelText('Password')).toHaveAccessibleDescription(new RegExp(`^${shortestPassword} characters`))
    expect(screen.getByLabelText('Password')).toHaveAttribute('autocomplete', 'new-password')
  })

  it('makes an account and goes on', async () => {
    email.mockResolvedValue({ data: {}, error: null })
    render(<SignUpForm next="/home" />)
    await fill(' Ada Lovelace ', 'ada@fennholt.example', 'three plain words')
    expect(email).toHaveBeenCalledWith({
      name: 'Ada Lovelace',
      email: 'ada@fennholt.example',
      password: 'three plain words',
    })
    await waitFor(() => expect(assign).toHaveBeenCalledWith('/home'))
  })

  it('refuses a short password, a bad address and no name, each beside its field', async () => {
    render(<SignUpForm next="/home" />)
    await fill('', 'ada@', 'x'.repeat(shortestPassword - 1))
    expect(screen.getByLabelText('Your name')).toBeInvalid()
    expect(screen.getByLabelText('Work e-mail')).toHaveAccessibleDescription(/not an e-mail address/)
    expect(screen.getByLabelText('Password')).toHaveAccessibleDescription(/too short/)
    expect(email).not.toHaveBeenCalled()
  })

  it('takes a password of just the length', async () => {
    email.mockResolvedValue({ data: {}, error: null })
    render(<SignUpForm next="/home" />)
    await fill('Ada', 'ada@fennholt.example', 'x'.repeat(shortestPassword))
    expect(email).toHaveBeenCalledOnce()
  })

  it('says when the address has an account already', async () => {
    email.mockResolvedValue({ data: null, error: { code: 'USER_ALREADY_EXISTS_USE_ANOTHER_EMAIL', status: 422 } })
    render(<SignUpForm next="/home" />)
    await fill('Ada', 'ada@fennholt.example', 'three plain words')
    expect(await screen.findByText(/already an account/)).toBeVisible()
    expect(assign).not.toHaveBeenCalled()
  })
})
