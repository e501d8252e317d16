import { newId } from '@/lib/book/ids'
import { archiveBook } from '@/lib/data/book/archive-book'
import { actionsOf, bookRoute, type DoorRow, everyone, makers, openers, owners, teamPage } from './door-kinds'
import { peopleDoors } from './door-table-people'
import { change, component } from './records'
import { blank, makeBook, type TestTeam, value } from './world'

/**
 * One row for each method of a route, page of a team or an account, and server action: who may, and how it is called.
 * A new one without a row fails the test of doors. What lies behind them is in the table of verbs.
 */

/** Routes and pages that need no row below. The reason stands beside each. */
export const openToAnybody: Record<string, string> = {
  'app/api/auth/[...all]/route.ts#GET': 'its doors have a table of their own: auth-doors.ts',
  'app/api/auth/[...all]/route.ts#POST': 'its doors have a table of their own: auth-doors.ts',
  'app/api/health/route.ts#GET': 'says whether the server works, and nothing else',
  'app/local/mail/messages.json/route.ts#GET': "mails on somebody's own machine; its tests are with the stand-in's",
  'app/(team)/[team]/page.tsx': 'leads to the list of books, which decides',
}

const changes = () => ({ changes: [change({ create: [component('W')] })] })
const books = 'app/(team)/[team]/books'
const bookAction = actionsOf(() => import('@/app/(team)/[team]/books/actions'))
const archived = async (at: TestTeam) => {
  const book = await makeBook(at)
  value(await archiveBook(at.people.owner, { team: at.slug, book }))
  return book
}

export const doorTable: Record<string, DoorRow> = {
  ...peopleDoors,
  'app/api/books/[book]/route.ts#GET': bookRoute(
    openers,
    async () => (await import('@/app/api/books/[book]/route')).GET,
    '',
  ),
  'app/api/books/[book]/changes/route.ts#GET': bookRoute(
    openers,
    async () => (await import('@/app/api/books/[book]/changes/route')).GET,
    '/changes?after=0',
  ),
  'app/api/books/[book]/changes/route.ts#POST': bookRoute(
    makers,
    async () => (await import('@/app/api/books/[book]/changes/route')).POST,
    '/changes',
    changes,
  ),
  'app/api/books/[book]/table.xlsx/route.ts#GET': bookRoute(
    openers,
    async () => (await import('@/app/api/books/[book]/table.xlsx/route')).GET,
    '/table.xlsx',
  ),
  [`${books}/page.tsx`]: teamPage(everyone, () => import('@/app/(team)/[team]/books/page')),
  [`${books}/[book]/page.tsx`]: teamPage(
    openers,
    () => import('@/app/(team)/[team]/books/[book]/page'),
    async (at) => ({ book: await makeBook(at) }),
  ),
  [`${books}/actions.ts#createBook`]: bookAction(makers, (actions, at) =>
    actions.createBook(at.slug, { projectId: at.project, name: newId(), from: blank as never }),
  ),
  [`${books}/actions.ts#duplicateBook`]: bookAction(
    makers,
    (actions, at, book) => actions.duplicateBook(at.slug, { book, name: 'Again' }),
    makeBook,
  ),
  [`${books}/actions.ts#archiveBook`]: bookAction(
    makers,
    (actions, at, book) => actions.archiveBook(at.slug, { book }),
    makeBook,
  ),
  [`${books}/actions.ts#restoreBook`]: bookAction(
    makers,
    (actions, at, book) => actions.restoreBook(at.slug, { book }),
    archived,
  ),
  [`${books}/actions.ts#createProject`]: bookAction(owners, (actions, at) =>
    actions.createProject(at.slug, { name: 'Kiln' }),
  ),
  [`${books}/actions.ts#renameProject`]: bookAction(owners, (actions, at) =>
    actions.renameProject(at.slug, { project: at.project, name: 'Kiln' }),
  ),
}
