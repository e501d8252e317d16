'use client'

import { Copy } from 'lucide-react'
import { Button } from '@/components/ui/button'
import { notify, notifyProblem } from '@/components/ui/toast'

type BackupCodesProps = { codes: readonly string[]; onKept: () => void }

/** The backup codes, which are shown this once. */
export function BackupCodes({ codes, onKept }: BackupCodesProps) {
  const copy = () =>
    navigator.clipboard.writeText(codes.join('\n')).then(
      () => notify('The backup codes are on the clipboard.'),
      () => notifyProblem('The browser did not let them be copied. Mark them and copy them by hand.'),
    )
  return (
    <div className="grid gap-3">
      <p>
        <strong>Keep these backup codes now: they are not shown again.</strong> Each stands in once for the code of your
        authenticator, should you lose it. Without both, nobody can let you in.
      </p>
      <ul
        aria-label="Backup codes"
        className="grid grid-cols-2 gap-x-6 gap-y-1 justify-self-start rounded-control border border-hair-2 bg-paper px-4 py-3 font-mono"
      >
        {codes.map((code) => (
          <li key={code}>{code}</li>
        ))}
      </ul>
      <div className="flex flex-wrap gap-2">
        <Button onClick={() => void copy()}>
          <Copy className="size-4" aria-hidden="true" />
          Copy them
        </Button>
        <Button look="main" onClick={onKept}>
          I have kept them
        </Button>
      </div>
    </div>
  )
}
