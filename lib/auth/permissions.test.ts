import { describe, expect, it } from 'vitest'
import { type Action, actions, isRole, mayDo, roles, seesEveryProject } from './permissions'

const allowed = (role: string) => actions.filter((action) => mayDo(role, action))

describe('permissions', () => {
  it('lets an owner do everything', () => {
    expect(allowed('owner')).toEqual(actions)
  })

  it('gives each other role its own', () => {
    expect(allowed('engineer')).toEqual(
      actions.filter((action) => !['project.create', 'project.rename', 'mail.list'].includes(action)),
    )
    expect(allowed('checker')).toEqual(['team.see', 'project.list', 'book.list', 'book.read'])
    expect(allowed('analyst')).toEqual(['team.see', 'project.list', 'book.list'])
    expect(allowed('reader')).toEqual(['team.see', 'project.list', 'book.list'])
  })

  it.each(['', 'admin', 'Owner', 'owner,reader', 'constructor', '__proto__'])(
    'lets the role "%s" do nothing',
    (role) => {
      expect(allowed(role)).toEqual([])
      expect(isRole(role)).toBe(false)
      expect(seesEveryProject(role)).toBe(false)
    },
  )

  it.each(['toString', 'book.delete', '__proto__', ''])('lets nobody do "%s"', (action) => {
    for (const role of roles) expect(mayDo(role, action as Action)).toBe(false)
  })
})
