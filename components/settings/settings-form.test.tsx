import { render, screen } from '@testing-library/react'
import userEvent from '@testing-library/user-event'
import { beforeEach, expect, it, vi } from 'vitest'
import { fail, ok } from '@/lib/errors'
import { SettingsForm } from './settings-form'
import type { Settings } from './types'

const settings: Settings = {
  name: 'Fennholt',
  massFlowUnit: 'kg/h',
  moleFlowUnit: 'kmol/h',
  decimal: 'own',
  flowDigits: null,
  fractionDigits: 4,
  carriedDigits: null,
  closureLimit: 0.1,
  analysisLow: 98,
  analysisHigh: 102,
  weakLimit: 10,
  mailDomains: ['fennholt.example'],
}
const update = vi.fn()
beforeEach(() => update.mockReset())

function show(mayChange = true) {
  render(<SettingsForm settings={settings} mayChange={mayChange} updateSettings={update} />)
  return userEvent.setup()
}
const keep = (user: ReturnType<typeof userEvent.setup>) =>
  user.click(screen.getByRole('button', { name: 'Keep the settings' }))
const type = async (user: ReturnType<typeof userEvent.setup>, label: string, text: string) => {
  await user.clear(screen.getByLabelText(label))
  if (text) await user.type(screen.getByLabelText(label), text)
}

it('sends what was changed and nothing else, with a point or a comma', async () => {
  update.mockResolvedValue(ok(settings))
  const user = show()
  await type(user, 'A balance closes within', '0,5')
  await type(user, 'Mail domains', 'fennholt.example, lindale.example')
  await user.selectOptions(screen.getByLabelText('Decimal sign'), 'comma')
  await user.selectOptions(screen.getByLabelText('Digits of fractions'), '')
  await keep(user)
  expect(update).toHaveBeenCalledWith({
    closureLimit: 0.5,
    mailDomains: ['fennholt.example', 'lindale.example'],
    decimal: 'comma',
    fractionDigits: null,
  })
})

it('asks the server nothing when nothing was changed, or when a number is none', async () => {
  const user = show()
  await keep(user)
  await type(user, 'A solved value is weak above', 'ten')
  await keep(user)
  expect(screen.getByLabelText('A solved value is weak above')).toBeInvalid()
  expect(update).not.toHaveBeenCalled()
})

it('shows a refusal beside its field, or else at the head', async () => {
  const issues = [
    { path: 'changes.analysisHigh', what: 'must be above the lower limit' },
    { path: 'changes.mailDomains.1', what: 'is no mail domain: it looks like company.com' },
  ]
  update.mockResolvedValueOnce(fail('badInput', 'What was sent is not right.', { issues }))
  const user = show()
  await type(user, 'An analysis is complete up to', '90')
  await keep(user)
  expect(await screen.findByRole('alert')).toHaveTextContent('The upper limit of an analysis must be above')
  expect(screen.getByLabelText('An analysis is complete up to')).toBeInvalid()
  expect(screen.getByLabelText('Mail domains')).toHaveAccessibleDescription(/One of the mail domains is no mail domain/)
  update.mockResolvedValueOnce(fail('notAllowed', 'Your role in this team is engineer.'))
  await keep(user)
  expect(await screen.findByText('Your role in this team is engineer.')).toBeVisible()
})

it('is only read by others than owners', () => {
  show(false)
  expect(screen.getByLabelText('Name')).toBeDisabled()
  expect(screen.queryByRole('button')).toBeNull()
})
