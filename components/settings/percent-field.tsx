import { Field, Input } from '@/components/ui/field'

type PercentFieldProps = { field: string; label: string; hint: string; value: number; error: string | undefined }

/** A limit in per cent. */
export function PercentField({ field: name, label, hint, value, error }: PercentFieldProps) {
  return (
    <Field id={name} label={label} hint={hint} error={error}>
      {(field) => (
        <span className="flex items-center gap-2">
          <Input
            {...field}
            name={name}
            defaultValue={value}
            inputMode="decimal"
            autoComplete="off"
            className="max-w-28"
          />
          <span aria-hidden="true">%</span>
          <span className="sr-only">per cent</span>
        </span>
      )}
    </Field>
  )
}
