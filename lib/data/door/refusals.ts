import type { Role } from '@/lib/auth/permissions'
import { fail } from '@/lib/errors'

/** The refusals that every verb gives in the same words. */
export const signedOut = () => fail('signedOut', 'You are signed out. Sign in to go on.')
export const noSuchTeam = () => fail('notFound', 'There is no such team, or you are not in it.')
export const noSuchProject = () => fail('notFound', 'There is no such project in this team.')
export const noSuchMember = () => fail('notFound', 'There is no such person in this team.')
export const lastOwner = () =>
  fail('conflict', 'A team needs an owner who can sign in to it. Make somebody else an owner first.')
export const noSuchInvitation = () =>
  fail('notFound', 'There is no such open invitation in this team. It may have been accepted or withdrawn.')
export const noSuchBook = () => fail('notFound', 'There is no such book, or you are not in its team.')
export const roleTooLow = (role: Role) =>
  fail('notAllowed', `Your role in this team is ${role}, which does not allow this. Ask an owner of the team.`)
export const bookArchived = () => fail('conflict', 'This book is archived. Restore it first.')
