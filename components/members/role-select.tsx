import { Select } from '@/components/ui/select'
import { type Role, roles } from '@/lib/auth/permissions'
import { roleName } from './role-words'

type RoleSelectProps = { name: string; role: Role; isBusy: boolean; onChange: (role: Role) => void }

/** The role of somebody, to be changed. */
export function RoleSelect({ name, role, isBusy, onChange }: RoleSelectProps) {
  return (
    <Select
      aria-label={`Role of ${name}`}
      aria-busy={isBusy || undefined}
      wrapperClassName="max-w-36"
      value={role}
      onChange={(event) => {
        const chosen = roles.find((one) => one === event.currentTarget.value)
        if (chosen && chosen !== role && !isBusy) onChange(chosen)
      }}
    >
      {roles.map((one) => (
        <option key={one} value={one}>
          {roleName(one)}
        </option>
      ))}
    </Select>
  )
}
