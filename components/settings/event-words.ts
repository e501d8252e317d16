import { aRole, listed } from '@/components/members/role-words'
import { isRole } from '@/lib/auth/permissions'
import type { TeamEventView } from '@/lib/data/audit/list-team-events'
import { changesSentence } from './setting-words'

type Detail = Record<string, unknown>

const text = (detail: Detail, field: string): string => (typeof detail[field] === 'string' ? detail[field] : '')
const names = (detail: Detail, field: string): string[] =>
  Array.isArray(detail[field]) ? detail[field].filter((name) => typeof name === 'string') : []
const quoted = (name: string) => `“${name}”`
const role = (value: string) => (isRole(value) ? aRole(value) : value)

/** What was done, in words that follow the name of who did it. */
const words: Record<string, (detail: Detail, subject: string) => string> = {
  'team.create': (detail) => `made the team ${quoted(text(detail, 'name'))}`,
  'team.leave': (detail) => `left the team, as ${role(text(detail, 'role'))}`,
  'project.create': (detail, subject) => `made the project ${quoted(text(detail, 'name') || subject)}`,
  'project.rename': (detail) => `renamed the project ${quoted(text(detail, 'from'))} to ${quoted(text(detail, 'to'))}`,
  'book.create': (detail, subject) => `made the book ${quoted(text(detail, 'name') || subject)}`,
  'book.duplicate': (detail, subject) => `copied a book as ${quoted(text(detail, 'name') || subject)}`,
  'book.archive': (_, subject) => `archived ${theBook(subject)}`,
  'book.restore': (_, subject) => `restored ${theBook(subject)}`,
  'invitation.invite': (detail) =>
    `invited ${text(detail, 'email')} as ${role(text(detail, 'role'))}${inProjects(names(detail, 'projects'))}`,
  'invitation.resend': (detail) => `sent the invitation of ${text(detail, 'email')} again`,
  'invitation.revoke': (detail) => `withdrew the invitation of ${text(detail, 'email')}`,
  'invitation.accept': (detail) =>
    `came into the team as ${role(text(detail, 'role'))}, invited as ${text(detail, 'email')}`,
  'member.changeRole': (detail, subject) =>
    `made ${text(detail, 'name') || subject} ${role(text(detail, 'to'))}, before ${role(text(detail, 'from'))}${inProjects(names(detail, 'projects'))}`,
  'member.setProjects': (detail, subject) =>
    'people' in detail
      ? `chose who belongs to the project ${quoted(text(detail, 'name'))}: ${orNobody(names(detail, 'people'))}`
      : `chose the projects of ${text(detail, 'name') || subject}: ${orNone(names(detail, 'projects'))}`,
  'member.deactivate': (detail, subject) => `deactivated ${text(detail, 'name') || subject}`,
  'member.reactivate': (detail, subject) => `reactivated ${text(detail, 'name') || subject}`,
  'member.remove': (detail, subject) => `removed ${text(detail, 'name') || subject} from the team`,
  'settings.change': (detail) => changesSentence(detail),
}

const theBook = (name: string) => (name === '' ? 'a book that is no more' : `the book ${quoted(name)}`)
const inProjects = (projects: string[]) =>
  projects.length === 0 ? '' : `, for ${projects.length === 1 ? 'project' : 'projects'} ${listed(projects.map(quoted))}`
const orNone = (projects: string[]) => (projects.length === 0 ? 'none' : listed(projects.map(quoted)))
const orNobody = (people: string[]) => (people.length === 0 ? 'nobody' : listed(people))

/** An event as a sentence: "Ada invited mo@plant.example as an analyst, for project “Salt”." */
export function eventSentence({
  by,
  action,
  subject,
  detail,
}: Pick<TeamEventView, 'by' | 'action' | 'subject' | 'detail'>) {
  const say = Object.hasOwn(words, action) ? words[action] : undefined
  const what = say ? say(detail, subject.name ?? '') : `did something else (${action})`
  return `${by.name} ${what}.`
}
