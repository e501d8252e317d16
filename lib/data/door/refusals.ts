import type { Role } from '@/lib/auth/permissions'
import { fail } from '@/lib/errors'

/** The refusals that every verb gives in the same words. */
export const signedOut = () => fail('signedOut', 'You are signed out. Sign in to go on.')
export const noSuchTeam = () => fail('notFound', 'There is no such team, or you are not in it.')
export const noSuchProject = () => fail('notFound', 'There is no such project in this team.')
export const noSuchBook = () => fail('notFound', 'There is no such book, or you are not in its team.')
export const roleTooLow = (role: Role) =>
  fail('notAllowed', `Your role in this team is ${role}, which does not allow this. Ask an owner of the team.`)
export const bookArchived = () => fail('conflict', 'This book is archived. Restore it first.')
