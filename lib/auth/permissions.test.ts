import { describe, expect, it } from 'vitest'
import { type Action, actions, isRole, mayDo, roles, seesEveryProject } from './permissions'

const allowed = (role: string) => actions.filter((action) => mayDo(role, action))

describe('permissions', () => {
  it('lets an owner do everything', () => {
    expect(allowed('owner')).toEqual(actions)
  })

  it('gives each other role its own', () => {
    const all = ['team.see', 'team.leave', 'settings.see', 'project.list', 'book.list']
    const inEveryProject = ['member.list', 'book.read']
    const makingBooks = ['book.create', 'book.duplicate', 'book.edit', 'book.archive', 'book.restore']
    expect(allowed('engineer').sort()).toEqual([...all, ...inEveryProject, ...makingBooks].sort())
    expect(allowed('checker').sort()).toEqual([...all, ...inEveryProject].sort())
    expect(allowed('analyst').sort()).toEqual([...all].sort())
    expect(allowed('reader').sort()).toEqual([...all].sort())
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
