'use client'

import { useRouter } from 'next/navigation'
import { useState } from 'react'
import { Button } from '@/components/ui/button'
import { Tag } from '@/components/ui/tag'
import { notify } from '@/components/ui/toast'
import { authClient } from '@/lib/auth/client'
import { AccountPart } from './account-part'
import { BackupCodes } from './backup-codes'
import { PasswordStep } from './password-step'
import { ScanStep } from './scan-step'

type Step =
  | { at: 'rest' }
  | { at: 'password'; to: 'turnOn' | 'turnOff' | 'newCodes' }
  | { at: 'scan'; uri: string; codes: string[] }
  | { at: 'codes'; codes: string[] }

/** The second step of signing in: set up, new backup codes, and off again. */
export function SecondFactor({ isOn }: { isOn: boolean }) {
  const router = useRouter()
  const [step, setStep] = useState<Step>({ at: 'rest' })
  const rest = () => setStep({ at: 'rest' })

  return (
    <AccountPart
      title="Second step of signing in"
      intro="Besides the password, a code from an authenticator on your telephone: a stolen password alone opens nothing then."
    >
      {step.at === 'rest' ? (
        <div className="flex flex-wrap items-center gap-2">
          <Tag tone={isOn ? 'brook' : 'quiet'}>{isOn ? 'On' : 'Off'}</Tag>
          {isOn ? (
            <>
              <Button onClick={() => setStep({ at: 'password', to: 'newCodes' })}>New backup codes</Button>
              <Button look="danger" onClick={() => setStep({ at: 'password', to: 'turnOff' })}>
                Turn it off
              </Button>
            </>
          ) : (
            <Button onClick={() => setStep({ at: 'password', to: 'turnOn' })}>Set it up</Button>
          )}
        </div>
      ) : null}
      {step.at === 'password' && step.to === 'turnOn' ? (
        <PasswordStep
          text="First your password; then a QR code is shown."
          verb="Go on"
          ask={(password) => authClient.twoFactor.enable({ password })}
          onDone={(data) =>
            data?.method === 'totp' && setStep({ at: 'scan', uri: data.totpURI, codes: data.backupCodes })
          }
          onCancel={rest}
        />
      ) : null}
      {step.at === 'password' && step.to === 'newCodes' ? (
        <PasswordStep
          text="The backup codes that you have now end, and ten new ones are shown."
          verb="Make new codes"
          ask={(password) => authClient.twoFactor.generateBackupCodes({ password })}
          onDone={(data) => data && setStep({ at: 'codes', codes: data.backupCodes })}
          onCancel={rest}
        />
      ) : null}
      {step.at === 'password' && step.to === 'turnOff' ? (
        <PasswordStep
          text="Signing in asks for the password alone from then on."
          verb="Turn it off"
          isDanger
          ask={(password) => authClient.twoFactor.disable({ password })}
          onDone={() => {
            notify('The second step is turned off.')
            rest()
            router.refresh()
          }}
          onCancel={rest}
        />
      ) : null}
      {step.at === 'scan' ? (
        <ScanStep
          uri={step.uri}
          onDone={() => {
            setStep({ at: 'codes', codes: step.codes })
            router.refresh()
          }}
          onCancel={rest}
        />
      ) : null}
      {step.at === 'codes' ? <BackupCodes codes={step.codes} onKept={rest} /> : null}
    </AccountPart>
  )
}
