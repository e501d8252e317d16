import type { Context } from '@/lib/auth/context'
import type { Role } from '@/lib/auth/permissions'
import { newId } from '@/lib/book/ids'
import { archiveBook } from '@/lib/data/book/archive-book'
import { createBook } from '@/lib/data/book/create-book'
import { duplicateBook } from '@/lib/data/book/duplicate-book'
import { exportStreamTable } from '@/lib/data/book/export-stream-table'
import { getBook } from '@/lib/data/book/get-book'
import { listBooks } from '@/lib/data/book/list-books'
import { listChanges } from '@/lib/data/book/list-changes'
import { restoreBook } from '@/lib/data/book/restore-book'
import { writeChanges } from '@/lib/data/book/write-changes'
import { listDeliveries } from '@/lib/data/mail/list-deliveries'
import { createProject } from '@/lib/data/project/create-project'
import { listProjects } from '@/lib/data/project/list-projects'
import { renameProject } from '@/lib/data/project/rename-project'
import { getTeam } from '@/lib/data/team/get-team'
import { listMyTeams } from '@/lib/data/team/list-my-teams'
import type { Result } from '@/lib/errors'
import { peopleVerbs } from './verb-table-people'
import { blank, makeBook, type TestTeam } from './world'

/**
 * One row for each verb of lib/data: who may, and what it is called with. The matrix test runs each row against five roles
 * in four standings; a verb file without a row fails it.
 */
export type VerbRow = {
  may: readonly Role[]
  /** A success leaves a trace in the team, or in what is the caller's own; a refusal leaves none. */
  writes: 'team' | 'own' | 'nothing'
  /** Names a team or a book, so that another team's people are refused. */
  ofTeam: boolean
  /** What everybody gets who is signed in, whatever their role and team. */
  answer?: string
  /** What those get who are signed out; left out: that they are. */
  signedOut?: string
  /** What the caller has to have, made before the call. */
  provide?: (ctx: Context) => Promise<void>
  /** The call, ready to be made by anybody: what it needs in the team is made first. */
  prepare: (at: TestTeam) => Promise<(ctx: Context) => Promise<Result<unknown>>>
}

const everyone: readonly Role[] = ['owner', 'engineer', 'analyst', 'checker', 'reader']
const makers: readonly Role[] = ['owner', 'engineer']
const openers: readonly Role[] = ['owner', 'engineer', 'checker']

export const verbTable: Record<string, VerbRow> = {
  ...peopleVerbs,
  'team/list-my-teams': {
    may: everyone,
    writes: 'nothing',
    ofTeam: false,
    prepare: async () => (ctx) => listMyTeams(ctx, {}),
  },
  'team/get-team': {
    may: everyone,
    writes: 'nothing',
    ofTeam: true,
    prepare: async (at) => (ctx) => getTeam(ctx, { team: at.slug }),
  },
  'project/list-projects': {
    may: everyone,
    writes: 'nothing',
    ofTeam: true,
    prepare: async (at) => (ctx) => listProjects(ctx, { team: at.slug }),
  },
  'project/create-project': {
    may: ['owner'],
    writes: 'team',
    ofTeam: true,
    prepare: async (at) => (ctx) => createProject(ctx, { team: at.slug, name: 'Kiln' }),
  },
  'project/rename-project': {
    may: ['owner'],
    writes: 'team',
    ofTeam: true,
    prepare: async (at) => (ctx) => renameProject(ctx, { team: at.slug, project: at.project, name: 'Kiln' }),
  },
  'mail/list-deliveries': {
    may: ['owner'],
    writes: 'nothing',
    ofTeam: true,
    prepare: async (at) => (ctx) => listDeliveries(ctx, { team: at.slug }),
  },
  'book/list-books': {
    may: everyone,
    writes: 'nothing',
    ofTeam: true,
    prepare: async (at) => (ctx) => listBooks(ctx, { team: at.slug }),
  },
  'book/create-book': {
    may: makers,
    writes: 'team',
    ofTeam: true,
    prepare: async (at) => (ctx) =>
      createBook(ctx, { team: at.slug, projectId: at.project, name: 'Kiln', from: blank }),
  },
  'book/duplicate-book': {
    may: makers,
    writes: 'team',
    ofTeam: true,
    prepare: async (at) => {
      const book = await makeBook(at)
      return (ctx) => duplicateBook(ctx, { team: at.slug, book, name: 'Kiln' })
    },
  },
  'book/archive-book': {
    may: makers,
    writes: 'team',
    ofTeam: true,
    prepare: async (at) => {
      const book = await makeBook(at)
      return (ctx) => archiveBook(ctx, { team: at.slug, book })
    },
  },
  'book/restore-book': {
    may: makers,
    writes: 'team',
    ofTeam: true,
    prepare: async (at) => {
      const book = await makeBook(at)
      await archiveBook(at.people.owner, { team: at.slug, book })
      return (ctx) => restoreBook(ctx, { team: at.slug, book })
    },
  },
  'book/get-book': {
    may: openers,
    writes: 'nothing',
    ofTeam: true,
    prepare: async (at) => {
      const book = await makeBook(at)
      return (ctx) => getBook(ctx, { book })
    },
  },
  'book/export-stream-table': {
    may: openers,
    writes: 'nothing',
    ofTeam: true,
    prepare: async (at) => {
      const book = await makeBook(at)
      return (ctx) => exportStreamTable(ctx, { book })
    },
  },
  'book/list-changes': {
    may: openers,
    writes: 'nothing',
    ofTeam: true,
    prepare: async (at) => {
      const book = await makeBook(at)
      return (ctx) => listChanges(ctx, { book, after: 0 })
    },
  },
  'book/write-changes': {
    may: makers,
    writes: 'team',
    ofTeam: true,
    prepare: async (at) => {
      const book = await makeBook(at)
      const water = {
        kind: 'component' as const,
        id: newId(),
        tag: 'W',
        name: 'Water',
        formula: null,
        molarMass: null,
        position: 1,
      }
      const change = { id: newId(), label: 'Component W', create: [water], update: [], remove: [] }
      return (ctx) => writeChanges(ctx, { book, changes: [change] })
    },
  },
}
