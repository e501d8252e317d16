import { type Role, roles } from '@/lib/auth/permissions'
import { mayWords, roleName, roleWords } from './role-words'

type RoleChoiceProps = { value: Role; onChange: (role: Role) => void }

/** The five roles, each with what it may do. */
export function RoleChoice({ value, onChange }: RoleChoiceProps) {
  return (
    <fieldset>
      <legend className="mb-1 font-semibold">Role</legend>
      <div className="overflow-hidden rounded-control border border-hair-2">
        {roles.map((role) => (
          <label
            key={role}
            className="flex cursor-pointer gap-3 border-b border-hair px-3 py-2 last:border-b-0 has-checked:bg-brook-wash has-focus-visible:outline-2 has-focus-visible:-outline-offset-2 has-focus-visible:outline-focus"
          >
            <input
              type="radio"
              name="role"
              value={role}
              checked={value === role}
              onChange={() => onChange(role)}
              className="mt-1 accent-brook outline-none"
            />
            <span>
              <span className="font-semibold">{roleName(role)}</span>{' '}
              <span className="text-xs text-ink-3">{roleWords[role].who}</span>
              <span className="block text-sm text-ink-2">{mayWords(role)}</span>
            </span>
          </label>
        ))}
      </div>
    </fieldset>
  )
}
