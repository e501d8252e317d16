import { describe, expect, it } from 'vitest'
import { actions } from '@/lib/auth/permissions'
import { eventSentence } from './event-words'

const by = { id: 'a', name: 'Ada' }
const say = (action: string, detail: Record<string, unknown>, name: string | null = null) =>
  eventSentence({ by, action, subject: { kind: 'x', id: 'x', name }, detail })

describe('an event as a sentence', () => {
  it.each([
    [
      'invitation.invite',
      { email: 'mo@x.example', role: 'analyst', projects: ['Salt'] },
      'Ada invited mo@x.example as an analyst, for project “Salt”.',
    ],
    [
      'member.changeRole',
      { name: 'Mo', from: 'engineer', to: 'checker' },
      'Ada made Mo a checker, before an engineer.',
    ],
    ['member.setProjects', { name: 'Mo', projects: [] }, 'Ada chose the projects of Mo: none.'],
    [
      'member.setProjects',
      { name: 'Salt', people: ['Mo', 'Ned'] },
      'Ada chose who belongs to the project “Salt”: Mo and Ned.',
    ],
    [
      'settings.change',
      { closureLimit: { from: 0.1, to: 0.5 }, mailDomains: { from: [], to: ['x.example'] } },
      'Ada changed the closure limit from 0.1 % to 0.5 %; the mail domains from any to x.example.',
    ],
    ['team.leave', { name: 'Ada', role: 'owner' }, 'Ada left the team, as an owner.'],
    ['project.rename', { from: 'Salt', to: 'Brine' }, 'Ada renamed the project “Salt” to “Brine”.'],
    ['something.new', {}, 'Ada did something else (something.new).'],
    ['constructor', {}, 'Ada did something else (constructor).'],
  ])('%s', (action, detail, sentence) => {
    expect(say(action, detail)).toBe(sentence)
  })

  it('names a book as it is called now, and says when it is no more', () => {
    expect(say('book.archive', {}, 'Salt section')).toBe('Ada archived the book “Salt section”.')
    expect(say('book.archive', {}, null)).toBe('Ada archived a book that is no more.')
  })

  it('is there for everything that leaves a trace', () => {
    const silent = /\.(see|list|read|edit)$/
    for (const action of [...actions.filter((one) => !silent.test(one)), 'team.create', 'invitation.accept'])
      expect(say(action, {}), action).not.toContain('something else')
  })
})
