/** The five roles of a team, and the one table of who may do what. Pure: pages may ask it what to show. */
export const roles = ['owner', 'engineer', 'analyst', 'checker', 'reader'] as const
export type Role = (typeof roles)[number]

const everyone: readonly Role[] = roles
const bookMakers: readonly Role[] = ['owner', 'engineer']

/** Action -> roles that may. What is not in it, nobody may. */
const permissions = {
  'team.see': everyone,
  'team.leave': everyone,
  'member.list': ['owner', 'engineer', 'checker'],
  'member.changeRole': ['owner'],
  'member.setProjects': ['owner'],
  'member.deactivate': ['owner'],
  'member.reactivate': ['owner'],
  'member.remove': ['owner'],
  'invitation.list': ['owner'],
  'invitation.invite': ['owner'],
  'invitation.resend': ['owner'],
  'invitation.revoke': ['owner'],
  'settings.see': everyone,
  'settings.change': ['owner'],
  'event.list': ['owner'],
  'project.list': everyone,
  'project.create': ['owner'],
  'project.rename': ['owner'],
  'mail.list': ['owner'],
  /** Lists only what the role may read: an analyst's list is empty, and a reader's until a revision is issued. */
  'book.list': everyone,
  'book.read': ['owner', 'engineer', 'checker'],
  'book.create': bookMakers,
  'book.duplicate': bookMakers,
  'book.edit': bookMakers,
  'book.archive': bookMakers,
  'book.restore': bookMakers,
} as const satisfies Record<string, readonly Role[]>

export type Action = keyof typeof permissions
export const actions = Object.keys(permissions) as Action[]

/** Fails closed: an unknown role or an unknown action is never allowed. */
export function mayDo(role: string, action: Action): boolean {
  if (!Object.hasOwn(permissions, action)) return false
  return (permissions[action] as readonly string[]).includes(role)
}

/** The others see only the projects they belong to. */
export function seesEveryProject(role: string): boolean {
  return role === 'owner' || role === 'engineer' || role === 'checker'
}

export function isRole(value: string): value is Role {
  return (roles as readonly string[]).includes(value)
}
