import { render, screen, waitFor } from '@testing-library/react'
import userEvent from '@testing-library/user-event'
import { beforeEach, describe, expect, it, vi } from 'vitest'
import { SignInForm } from './sign-in-form'

const { email, verifyTotp, verifyBackupCode } = vi.hoisted(() => ({
  email: vi.fn(),
  verifyTotp: vi.fn(),
  verifyBackupCode: vi.fn(),
}))
vi.mock('@/lib/auth/client', () => ({
  authClient: { signIn: { email }, twoFactor: { verifyTotp, verifyBackupCode } },
}))

const assign = vi.fn()
beforeEach(() => {
  for (const call of [email, verifyTotp, verifyBackupCode]) call.mockReset()
  assign.mockReset()
  vi.spyOn(window.location, 'assign').mockImplementation(assign)
})

describe('SignInForm', () => {
  it('signs in by keyboard alone and goes on to where one was going', async () => {
    email.mockResolvedValue({ data: {}, error: null })
    render(<SignInForm next="/fennholt/books/b1" demo={null} />)
    const user = userEvent.setup()
    await user.tab()
    await user.keyboard('ada@fennholt.example')
    await user.tab()
    await user.keyboard('three plain words{Enter}')
    expect(email).toHaveBeenCalledWith({ email: 'ada@fennholt.example', password: 'three plain words' })
    await waitFor(() => expect(assign).toHaveBeenCalledWith('/fennholt/books/b1'))
  })

  it('lists what is missing, takes the focus there, and asks the server nothing', async () => {
    render(<SignInForm next="/home" demo={null} />)
    const user = userEvent.setup()
    await user.type(screen.getByLabelText('E-mail'), 'ada')
    await user.click(screen.getByRole('button', { name: 'Sign in' }))
    const summary = screen.getByRole('alert')
    expect(summary).toHaveFocus()
    expect(summary).toHaveTextContent('This is not an e-mail address')
    expect(summary).toHaveTextContent('Type your password')
    expect(screen.getByLabelText('E-mail')).toBeInvalid()
    expect(screen.getByLabelText('E-mail')).toHaveAccessibleDescription(/not an e-mail address/)
    await user.click(screen.getByRole('link', { name: 'Type your password.' }))
    expect(screen.getByLabelText('Password')).toHaveFocus()
    expect(email).not.toHaveBeenCalled()
  })

  it.each([
    [{ code: 'INVALID_EMAIL_OR_PASSWORD', status: 401 }, /do not belong together/],
    [{ status: 429 }, /Wait a minute/],
    [{ status: 500, message: 'x' }, /server could not do this/],
  ])('says what a refusal %j means and lets one try again', async (error, sentence) => {
    email.mockResolvedValue({ data: null, error })
    render(<SignInForm next="/home" demo={null} />)
    const user = userEvent.setup()
    await user.type(screen.getByLabelText('E-mail'), 'ada@fennholt.example')
    await user.type(screen.getByLabelText('Password'), 'wrong{Enter}')
    expect(await screen.findByText(sentence)).toBeVisible()
    expect(assign).not.toHaveBeenCalled()
    expect(screen.getByRole('button', { name: 'Sign in' })).not.toHaveAttribute('aria-disabled')
    expect(screen.getByLabelText('Password')).toHaveValue('wrong')
  })

  it('says so when nothing answers', async () => {
    email.mockRejectedValue(new TypeError('fetch failed'))
    render(<SignInForm next="/home" demo={null} />)
    const user = userEvent.setup()
    await user.type(screen.getByLabelText('E-mail'), 'ada@fennholt.example')
    await user.type(screen.getByLabelText('Password'), 'something{Enter}')
    expect(await screen.findByText(/did not answer/)).toBeVisible()
  })

  it('signs in as a demo account at one press, and shows none elsewhere', async () => {
    email.mockResolvedValue({ data: {}, error: null })
    const demo = { password: 'for all of them', accounts: [{ role: 'checker', email: 'checker@fennholt.example' }] }
    const { unmount } = render(<SignInForm next="/home" demo={demo} />)
    await userEvent.setup().click(screen.getByRole('button', { name: /checker@fennholt/ }))
    expect(email).toHaveBeenCalledWith({ email: 'checker@fennholt.example', password: 'for all of them' })
    unmount()
    render(<SignInForm next="/home" demo={null} />)
    expect(screen.queryByRole('heading', { name: /demo/ })).toBeNull()
  })

  it('shows the password when asked', async () => {
    render(<SignInForm next="/home" demo={null} />)
    const user = userEvent.setup()
    expect(screen.getByLabelText('Password')).toHaveAttribute('type', 'password')
    await user.click(screen.getByRole('button', { name: 'Show the password' }))
    expect(screen.getByLabelText('Password')).toHaveAttribute('type', 'text')
  })
})

describe('the second step', () => {
  const toSecondStep = async () => {
    email.mockResolvedValue({ data: { twoFactorRedirect: true, twoFactorMethods: ['totp'] }, error: null })
    render(<SignInForm next="/fennholt/books/b1" demo={null} />)
    const user = userEvent.setup()
    await user.type(screen.getByLabelText('E-mail'), 'ada@fennholt.example')
    await user.type(screen.getByLabelText('Password'), 'three plain words{Enter}')
    await screen.findByLabelText('Code from your authenticator')
    expect(assign).not.toHaveBeenCalled()
    return user
  }

  it('takes a code, however it is spaced, and goes on', async () => {
    verifyTotp.mockResolvedValue({ data: {}, error: null })
    const user = await toSecondStep()
    expect(screen.getByLabelText('Code from your authenticator')).toHaveFocus()
    await user.keyboard('123 456{Enter}')
    expect(verifyTotp).toHaveBeenCalledWith({ code: '123456' })
    await waitFor(() => expect(assign).toHaveBeenCalledWith('/fennholt/books/b1'))
  })

  it('says a wrong code beside its field, and takes a backup code instead', async () => {
    verifyTotp.mockResolvedValue({ data: null, error: { code: 'INVALID_CODE', status: 401 } })
    verifyBackupCode.mockResolvedValue({ data: {}, error: null })
    const user = await toSecondStep()
    await user.keyboard('000000{Enter}')
    const field = screen.getByLabelText('Code from your authenticator')
    await waitFor(() => expect(field).toHaveAccessibleDescription(/This code is not right/))
    await user.click(screen.getByRole('button', { name: 'Use a backup code' }))
    await user.type(screen.getByLabelText('Backup code'), 'AbCdE-fGhIj{Enter}')
    expect(verifyBackupCode).toHaveBeenCalledWith({ code: 'AbCdE-fGhIj' })
    await waitFor(() => expect(assign).toHaveBeenCalledOnce())
  })

  it.each(['TOO_MANY_ATTEMPTS_REQUEST_NEW_CODE', 'INVALID_TWO_FACTOR_COOKIE'])(
    'goes back to the password with the reason after %s',
    async (code) => {
      verifyTotp.mockResolvedValue({ data: null, error: { code, status: 400 } })
      const user = await toSecondStep()
      await user.keyboard('000000{Enter}')
      expect(await screen.findByLabelText('Password')).toBeVisible()
      expect(screen.getByRole('alert')).toHaveTextContent(/Begin again with your password/)
    },
  )
})
