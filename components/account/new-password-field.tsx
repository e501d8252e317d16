import { PasswordInput } from '@/components/front/password-input'
import { Field } from '@/components/ui/field'
import { longestPassword, shortestPassword } from '@/lib/auth/password'

type NewPasswordFieldProps = { id: string; label: string; error: string | undefined }

/** Where a new password is chosen; what is asked of it is told beforehand. Its name in the form is its id. */
export function NewPasswordField({ id, label, error }: NewPasswordFieldProps) {
  return (
    <Field
      id={id}
      label={label}
      hint={`${shortestPassword} characters or more. A few words in a row are easy to remember.`}
      error={error}
    >
      {(field) => <PasswordInput {...field} name={id} autoComplete="new-password" maxLength={longestPassword} />}
    </Field>
  )
}
