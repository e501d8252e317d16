import { createAccessControl } from 'better-auth/plugins/access'
import type { Role } from './permissions'

/**
 * What better-auth's own organisation calls let each role do. Members and invitations are an owner's. This stands behind
 * the permission table, not beside it: those calls are not reachable from outside (see doors.ts).
 */
const control = createAccessControl({
  organization: ['update', 'delete'],
  member: ['create', 'update', 'delete'],
  invitation: ['create', 'cancel'],
  team: ['create', 'update', 'delete'],
  ac: ['create', 'read', 'update', 'delete'],
} as const)

const nothing = () => control.newRole({ organization: [], member: [], invitation: [], team: [], ac: [] })

export const organisationAccess = control
export const organisationRoles = {
  owner: control.newRole({
    organization: ['update'],
    member: ['create', 'update', 'delete'],
    invitation: ['create', 'cancel'],
    team: [],
    ac: [],
  }),
  engineer: nothing(),
  analyst: nothing(),
  checker: nothing(),
  reader: nothing(),
} satisfies Record<Role, unknown>
