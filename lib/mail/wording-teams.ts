import type { MailWords } from './mail-words'
import type { MailRole, Message } from './message'
import { day } from './wording-time'

const duties: Record<MailRole, string> = {
  owner: 'an owner, who runs the team',
  engineer: 'an engineer, who makes and edits books',
  analyst: 'an analyst, who files the results of the laboratory',
  checker: 'a checker, who reads, comments and signs',
  reader: 'a reader, who reads and downloads what was issued',
}

const shownProjects = 8
const conjunction = new Intl.ListFormat('en-GB')

export function invitationWords({ team, inviter, role, projects, path, until }: Message<'invitation'>): MailWords {
  return {
    subject: `${inviter} invites you to “${team}”`,
    heading: `${inviter} invites you to “${team}”`,
    paragraphs: [
      `You are asked to join the team “${team}” on Tallybrook, where stream tables of plants are worked out together, as ${duties[role]}.`,
      ...projectWords(projects),
      `The invitation stands until ${day(until)}. You can accept it with an account that you have, or make one.`,
    ],
    action: { label: 'See the invitation', path },
    afterword: [
      'If you do not know who this is, leave it: you join nothing unless you accept.',
      'Do not pass this mail on: the invitation is for this address.',
    ],
  }
}

function projectWords(projects: string[]): string[] {
  if (projects.length === 0) return []
  const shown = projects.slice(0, shownProjects).map((project) => `“${project}”`)
  const more = projects.length - shown.length
  const list = conjunction.format(more > 0 ? [...shown, `${more} more`] : shown)
  return [`You will see the ${projects.length === 1 ? 'project' : 'projects'} ${list}.`]
}

export function membershipWords({ name, team, event }: Message<'membership'>): MailWords {
  const words = {
    deactivated: {
      heading: `You no longer work in “${team}”`,
      paragraph: `an owner of “${team}” has ended your access to it. Your name stays on what you did there.`,
    },
    reactivated: {
      heading: `You work in “${team}” again`,
      paragraph: `an owner of “${team}” has given you access to it again.`,
    },
    removed: {
      heading: `You were taken out of “${team}”`,
      paragraph: `an owner of “${team}” has taken you out of it. Your name stays on what you did there.`,
    },
  }[event]
  return {
    subject: words.heading,
    heading: words.heading,
    paragraphs: [`Hello ${name},`, words.paragraph],
    afterword: ['If this is a mistake, ask an owner of the team. Your account and your other teams are not touched.'],
  }
}

export function roleChangedWords({ name, team, role, path }: Message<'roleChanged'>): MailWords {
  return {
    subject: `Your role in “${team}” has changed`,
    heading: `Your role in “${team}” has changed`,
    paragraphs: [`Hello ${name},`, `in “${team}” you are now ${duties[role]}.`],
    action: { label: 'Go to the team', path },
    afterword: ['If this is a mistake, ask an owner of the team.'],
  }
}
