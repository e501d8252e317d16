import { PasswordInput } from '@/components/front/password-input'
import { Field } from '@/components/ui/field'

type PresentPasswordFieldProps = { id: string; label?: string; hint?: string; error: string | undefined }

/** Asked again before what a stranger at an open browser must not do. Its name in the form is its id. */
export function PresentPasswordField({ id, label = 'Your password', hint, error }: PresentPasswordFieldProps) {
  return (
    <Field id={id} label={label} hint={hint} error={error}>
      {(field) => <PasswordInput {...field} name={id} autoComplete="current-password" />}
    </Field>
  )
}
