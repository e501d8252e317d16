import { render, screen } from '@testing-library/react'
import userEvent from '@testing-library/user-event'
import { beforeEach, describe, expect, it, vi } from 'vitest'
import { shortestPassword } from '@/lib/auth/password'
import { SignUpForm } from './sign-up-form'

const { email, sendVerificationEmail } = vi.hoisted(() => ({ email: vi.fn(), sendVerificationEmail: vi.fn() }))
vi.mock('@/lib/auth/client', () => ({ authClient: { signUp: { email }, sendVerificationEmail } }))

beforeEach(() => {
  email.mockReset()
  sendVerificationEmail.mockReset()
})

async function fill(name: string, address: string, password: string) {
  const user = userEvent.setup()
  if (name) await user.type(screen.getByLabelText('Your name'), name)
  if (address) await user.type(screen.getByLabelText('Work e-mail'), address)
  if (password) await user.type(screen.getByLabelText('Password'), password)
  await user.click(screen.getByRole('button', { name: 'Make an account' }))
  return user
}

describe('SignUpForm', () => {
  it('tells the length of a password before one is typed', () => {
    render(<SignUpForm />)
    expect(screen.getByLabelText('Password')).toHaveAccessibleDescription(new RegExp(`^${shortestPassword} characters`))
    expect(screen.getByLabelText('Password')).toHaveAttribute('autocomplete', 'new-password')
  })

  it('makes an account and leads to the mailbox; the mail can be sent again', async () => {
    email.mockResolvedValue({ data: { token: null, user: null }, error: null })
    sendVerificationEmail.mockResolvedValue({ data: { status: true }, error: null })
    render(<SignUpForm />)
    const user = await fill(' Ada Lovelace ', 'ada@fennholt.example', 'three plain words')
    expect(email).toHaveBeenCalledWith({
      name: 'Ada Lovelace',
      email: 'ada@fennholt.example',
      password: 'three plain words',
    })
    expect(await screen.findByRole('heading', { name: 'Now look in your mail' })).toHaveFocus()
    expect(screen.getByText('ada@fennholt.example')).toBeVisible()
    await user.click(screen.getByRole('button', { name: 'Send it again' }))
    expect(sendVerificationEmail).toHaveBeenCalledWith({ email: 'ada@fennholt.example' })
    expect(await screen.findByText(/on its way again/)).toBeVisible()
    await user.click(screen.getByRole('button', { name: 'The address is wrong' }))
    expect(screen.getByLabelText('Work e-mail')).toBeVisible()
  })

  it('refuses a short password, a bad address and no name, each beside its field', async () => {
    render(<SignUpForm />)
    await fill('', 'ada@', 'x'.repeat(shortestPassword - 1))
    expect(screen.getByLabelText('Your name')).toBeInvalid()
    expect(screen.getByLabelText('Work e-mail')).toHaveAccessibleDescription(/not an e-mail address/)
    expect(screen.getByLabelText('Password')).toHaveAccessibleDescription(/too short/)
    expect(email).not.toHaveBeenCalled()
  })

  it('takes a password of just the length', async () => {
    email.mockResolvedValue({ data: {}, error: null })
    render(<SignUpForm />)
    await fill('Ada', 'ada@fennholt.example', 'x'.repeat(shortestPassword))
    expect(email).toHaveBeenCalledOnce()
  })

  it('says what a refusal means and lets one try again', async () => {
    email.mockResolvedValue({ data: null, error: { status: 429 } })
    render(<SignUpForm />)
    await fill('Ada', 'ada@fennholt.example', 'three plain words')
    expect(await screen.findByText(/Too many tries/)).toBeVisible()
    expect(screen.getByLabelText('Your name')).toHaveValue('Ada')
  })
})
