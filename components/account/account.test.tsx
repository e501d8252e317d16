import { render, screen, waitFor, within } from '@testing-library/react'
import userEvent from '@testing-library/user-event'
import { beforeEach, describe, expect, it, vi } from 'vitest'
import { ok } from '@/lib/errors'
import { EmailForm } from './email-form'
import { PasswordForm } from './password-form'
import { ResetForm } from './reset-form'
import { ResetRequestForm } from './reset-request-form'
import { SecondFactor } from './second-factor'
import { SessionsList } from './sessions-list'
import { VerifyForm } from './verify-form'

const client = vi.hoisted(() => ({
  requestPasswordReset: vi.fn(),
  resetPassword: vi.fn(),
  verifyEmail: vi.fn(),
  changePassword: vi.fn(),
  twoFactor: { enable: vi.fn(), disable: vi.fn(), verifyTotp: vi.fn(), generateBackupCodes: vi.fn() },
}))
const changeAddress = vi.hoisted(() => vi.fn())
const refresh = vi.hoisted(() => vi.fn())
vi.mock('@/lib/auth/client', () => ({ authClient: client, changeAddress }))
vi.mock('next/navigation', () => ({ useRouter: () => ({ refresh }) }))
beforeEach(() => vi.resetAllMocks())

const done = { data: {}, error: null }
const refused = (code: string, status = 400) => ({ data: null, error: { code, status } })

describe('a lost password', () => {
  it('is asked for with the same words for every address', async () => {
    client.requestPasswordReset.mockResolvedValue(done)
    render(<ResetRequestForm />)
    const user = userEvent.setup()
    await user.type(screen.getByLabelText('E-mail'), 'ada@x.example{Enter}')
    expect(client.requestPasswordReset).toHaveBeenCalledWith({ email: 'ada@x.example' })
    expect(await screen.findByText(/If there is an account with/)).toBeVisible()
  })

  it('is replaced, and a short one is refused before it is sent', async () => {
    client.resetPassword.mockResolvedValue(done)
    render(<ResetForm token="t0ken" />)
    const user = userEvent.setup()
    await user.type(screen.getByLabelText('New password'), 'short{Enter}')
    expect(screen.getByLabelText('New password')).toBeInvalid()
    expect(client.resetPassword).not.toHaveBeenCalled()
    await user.type(screen.getByLabelText('New password'), ' but then longer{Enter}')
    expect(client.resetPassword).toHaveBeenCalledWith({ newPassword: 'short but then longer', token: 't0ken' })
    expect(await screen.findByRole('link', { name: 'Sign in' })).toHaveAttribute('href', '/sign-in')
  })

  it('with a used link leads to asking for a new one', async () => {
    client.resetPassword.mockResolvedValue(refused('INVALID_TOKEN'))
    render(<ResetForm token="old" />)
    await userEvent.setup().type(screen.getByLabelText('New password'), 'three plain words{Enter}')
    expect(await screen.findByRole('heading', { name: 'This link is of no use any more' })).toHaveFocus()
    expect(screen.getByRole('link', { name: 'Ask for a new link' })).toHaveAttribute('href', '/reset')
  })
})

describe('confirming an address', () => {
  it.each([
    [done, 'Your address is confirmed'],
    [refused('TOKEN_EXPIRED', 401), 'This link is of no use any more'],
    [refused('INVALID_TOKEN', 401), 'This link is of no use any more'],
    [refused('ADDRESS_TAKEN'), 'Another account has this address by now'],
  ])('%j', async (answer, heading) => {
    client.verifyEmail.mockResolvedValue(answer)
    render(<VerifyForm token="t0ken" isSignedIn={false} />)
    expect(client.verifyEmail).not.toHaveBeenCalled()
    await userEvent.setup().click(screen.getByRole('button', { name: 'Confirm this address' }))
    expect(client.verifyEmail).toHaveBeenCalledWith({ query: { token: 't0ken' } })
    expect(await screen.findByRole('heading', { name: heading })).toBeVisible()
  })
})

describe('address and password', () => {
  it('another address waits until it is confirmed; a wrong password is said at its place', async () => {
    changeAddress.mockResolvedValueOnce(refused('INVALID_PASSWORD'))
    render(<EmailForm email="ada@x.example" />)
    const user = userEvent.setup()
    await user.type(screen.getByLabelText('New address'), 'ada@y.example')
    await user.type(screen.getByLabelText('Your password'), 'wrong one{Enter}')
    await waitFor(() =>
      expect(screen.getByLabelText('Your password')).toHaveAccessibleDescription('This is not your present password.'),
    )
    changeAddress.mockResolvedValueOnce(done)
    await user.type(screen.getByLabelText('Your password'), '{Enter}')
    expect(changeAddress).toHaveBeenLastCalledWith('ada@y.example', 'wrong one')
    expect(await screen.findByRole('status')).toHaveTextContent(/ada@y.example waits to be confirmed/)
    expect(screen.getByLabelText('Your password')).toHaveValue('')
  })

  it('a changed password ends the other sessions and empties the form', async () => {
    client.changePassword.mockResolvedValue(done)
    render(<PasswordForm email="ada@x.example" />)
    const user = userEvent.setup()
    await user.type(screen.getByLabelText('Present password'), 'three plain words')
    await user.type(screen.getByLabelText('New password'), 'four quite plain words{Enter}')
    expect(client.changePassword).toHaveBeenCalledWith({
      currentPassword: 'three plain words',
      newPassword: 'four quite plain words',
      revokeOtherSessions: true,
    })
    await waitFor(() => expect(refresh).toHaveBeenCalled())
    expect(screen.getByLabelText('New password')).toHaveValue('')
  })
})

describe('the second step', () => {
  const codes = ['AAAAA-BBBBB', 'CCCCC-DDDDD']
  const totpURI = 'otpauth://totp/Tallybrook:ada?secret=ABCDEFGHIJKL&issuer=Tallybrook'

  it('is turned on with the password and a first code, then the backup codes are shown once', async () => {
    client.twoFactor.enable.mockResolvedValue({ data: { method: 'totp', totpURI, backupCodes: codes }, error: null })
    client.twoFactor.verifyTotp.mockResolvedValueOnce(refused('INVALID_CODE', 401)).mockResolvedValueOnce(done)
    render(<SecondFactor isOn={false} />)
    const user = userEvent.setup()
    await user.click(screen.getByRole('button', { name: 'Set it up' }))
    await user.type(screen.getByLabelText('Your password'), 'three plain words{Enter}')
    expect(client.twoFactor.enable).toHaveBeenCalledWith({ password: 'three plain words' })
    expect(await screen.findByText('ABCD EFGH IJKL')).toBeVisible()
    expect(screen.getByRole('img', { name: /QR code/ })).toBeVisible()
    expect(screen.queryByText(codes[0] ?? '')).toBeNull()
    const field = screen.getByLabelText('The code that it shows now')
    await user.type(field, '000000{Enter}')
    await waitFor(() => expect(field).toHaveAccessibleDescription(/This code is not right/))
    await user.clear(field)
    await user.type(field, '123456{Enter}')
    const list = await screen.findByRole('list', { name: 'Backup codes' })
    expect(
      within(list)
        .getAllByRole('listitem')
        .map((item) => item.textContent),
    ).toEqual(codes)
    await user.click(screen.getByRole('button', { name: 'Copy them' }))
    expect(await navigator.clipboard.readText()).toBe(codes.join('\n'))
    await user.click(screen.getByRole('button', { name: 'I have kept them' }))
    expect(screen.queryByRole('list', { name: 'Backup codes' })).toBeNull()
  })

  it('is turned off with the password', async () => {
    client.twoFactor.disable.mockResolvedValue(done)
    render(<SecondFactor isOn />)
    const user = userEvent.setup()
    await user.click(screen.getByRole('button', { name: 'Turn it off' }))
    await user.type(screen.getByLabelText('Your password'), 'three plain words{Enter}')
    await waitFor(() => expect(refresh).toHaveBeenCalled())
    expect(client.twoFactor.disable).toHaveBeenCalledWith({ password: 'three plain words' })
  })
})

describe('sessions', () => {
  it('are listed with this one marked, and the others can be ended', async () => {
    const at = new Date()
    const session = { signedInAt: at, seenAt: at, expiresAt: at, ipAddress: '10.0.0.1' }
    const firefox = 'Mozilla/5.0 (X11; Linux x86_64; rv:140.0) Gecko/20100101 Firefox/140.0'
    const actions = {
      endSession: vi.fn().mockResolvedValue(ok({})),
      endOtherSessions: vi.fn().mockResolvedValue(ok({ ended: 1 })),
    }
    render(
      <SessionsList
        sessions={[
          { ...session, id: 's1', isThis: true, userAgent: firefox },
          { ...session, id: 's2', isThis: false, userAgent: null },
        ]}
        actions={actions}
      />,
    )
    const [mine, other] = screen.getAllByRole('listitem')
    expect(mine).toHaveTextContent('Firefox on Linux')
    expect(mine).toHaveTextContent('This one')
    expect(within(mine as HTMLElement).queryByRole('button')).toBeNull()
    const user = userEvent.setup()
    await user.click(within(other as HTMLElement).getByRole('button', { name: 'Sign out there' }))
    expect(actions.endSession).toHaveBeenCalledWith({ session: 's2' })
    await user.click(screen.getByRole('button', { name: 'Sign out everywhere else' }))
    expect(actions.endOtherSessions).toHaveBeenCalled()
  })
})
