import { Field } from '@/components/ui/field'
import { Select } from '@/components/ui/select'

type DigitsSelectProps = { field: string; label: string; hint?: string; value: number | null }

const choices = [2, 3, 4, 5, 6, 7, 8, 9]

/** How many significant digits a kind of row has. */
export function DigitsSelect({ field: name, label, hint, value }: DigitsSelectProps) {
  return (
    <Field id={name} label={label} hint={hint}>
      {(field) => (
        <Select {...field} name={name} defaultValue={value ?? ''}>
          <option value="">As many as the number asks for</option>
          {choices.map((digits) => (
            <option key={digits} value={digits}>
              {digits} significant
            </option>
          ))}
        </Select>
      )}
    </Field>
  )
}
