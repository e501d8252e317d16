import { render, screen, waitFor, within } from '@testing-library/react'
import userEvent from '@testing-library/user-event'
import { beforeEach, describe, expect, it, vi } from 'vitest'
import { Toaster } from '@/components/ui/toast'
import { mayDo, type Role } from '@/lib/auth/permissions'
import { fail, ok } from '@/lib/errors'
import { BooksView, type BooksViewProps } from './books-view'
import type { BookRow } from './types'

const push = vi.hoisted(() => vi.fn())
vi.mock('next/navigation', () => ({ useRouter: () => ({ push }) }))

const summary = (unknown: number) => ({
  given: 10,
  solvable: 20,
  unknown,
  atOdds: 0,
  degreesOfFreedom: unknown ? 1 : 0,
})
const book = (id: string, name: string, projectId: string, more: Partial<BookRow> = {}): BookRow => ({
  id,
  name,
  documentNumber: '',
  projectId,
  projectName: projectId === 'p1' ? 'Salt works' : 'Dairy',
  state: 'draft',
  changedAt: new Date('2026-03-01T10:00:00Z'),
  changedBy: { id: 'u1', name: 'Ada Lovelace' },
  summary: summary(0),
  archivedAt: null,
  ...more,
})
const books = [
  book('b1', 'Salt section', 'p1', { summary: summary(37), changedAt: new Date('2026-03-02T10:00:00Z') }),
  book('b2', 'Brine purification', 'p1', { documentNumber: 'KF-120', summary: summary(4) }),
  book('b3', 'Evaporation', 'p1', { summary: null, changedAt: new Date('2026-03-03T10:00:00Z') }),
  book('b4', 'Whey', 'p2', { changedBy: { id: 'u2', name: 'Grace Hopper' } }),
]

const actions = {
  createBook: vi.fn<BooksViewProps['actions']['createBook']>(),
  duplicateBook: vi.fn<BooksViewProps['actions']['duplicateBook']>(),
  archiveBook: vi.fn<BooksViewProps['actions']['archiveBook']>(),
  restoreBook: vi.fn<BooksViewProps['actions']['restoreBook']>(),
  createProject: vi.fn<BooksViewProps['actions']['createProject']>(),
  renameProject: vi.fn<BooksViewProps['actions']['renameProject']>(),
}
beforeEach(() => {
  push.mockReset()
  for (const action of Object.values(actions)) action.mockReset()
})

function show(role: Role, more: Partial<BooksViewProps> = {}) {
  render(
    <BooksView
      team={{ slug: 'fennholt', name: 'Fennholt', role }}
      books={books}
      projects={[
        { id: 'p2', name: 'Dairy' },
        { id: 'p1', name: 'Salt works' },
      ]}
      isArchive={false}
      flowUnits={{ mass: 't/d', mole: 'kmol/h' }}
      may={{
        readBooks: mayDo(role, 'book.read'),
        makeBooks: mayDo(role, 'book.create'),
        archiveBooks: mayDo(role, 'book.archive'),
        makeProjects: mayDo(role, 'project.create'),
        renameProjects: mayDo(role, 'project.rename'),
      }}
      actions={actions}
      {...more}
    />,
  )
  return userEvent.setup()
}
const names = () =>
  screen.getAllByRole('link', { name: /^(Salt section|Brine|Evaporation|Whey)/ }).map((a) => a.textContent)

describe('the list of books', () => {
  it('stands by project, last changed first, each leading to its book', () => {
    show('engineer')
    expect(names()).toEqual(['Whey', 'Evaporation', 'Salt section', 'Brine purification'])
    expect(screen.getByRole('link', { name: 'Whey' })).toHaveAttribute('href', '/fennholt/books/b4')
    expect(screen.getByRole('columnheader', { name: 'Last change' })).toHaveAttribute('aria-sort', 'descending')
  })

  it('sorts by name and by what is unknown, books not worked out last', async () => {
    const user = show('engineer')
    await user.click(screen.getByRole('button', { name: 'Book' }))
    expect(names()).toEqual(['Whey', 'Brine purification', 'Evaporation', 'Salt section'])
    await user.click(screen.getByRole('button', { name: 'Still unknown' }))
    expect(names()).toEqual(['Whey', 'Salt section', 'Brine purification', 'Evaporation'])
    await user.click(screen.getByRole('button', { name: 'Still unknown' }))
    expect(names()).toEqual(['Whey', 'Brine purification', 'Salt section', 'Evaporation'])
    expect(screen.getByRole('columnheader', { name: 'Still unknown' })).toHaveAttribute('aria-sort', 'ascending')
  })

  it.each([
    ['brine', ['Brine purification']],
    ['kf-120', ['Brine purification']],
    ['hopper', ['Whey']],
    ['dairy', ['Whey']],
  ])('finds "%s" by name, document number, person and project', async (typed, found) => {
    const user = show('engineer')
    await user.type(screen.getByRole('searchbox', { name: 'Search books' }), typed)
    await waitFor(() => expect(names()).toEqual(found))
    expect(
      screen.getByText(found.length === 1 ? '1 book' : `${found.length} books`, { selector: '[role=status]' }),
    ).toBeInTheDocument()
  })

  it('says when nothing is found', async () => {
    const user = show('engineer')
    await user.type(screen.getByRole('searchbox', { name: 'Search books' }), 'zzz')
    expect(await screen.findByText(/holds “zzz”/)).toBeVisible()
  })

  it('tells how far each book is, in words', () => {
    show('engineer')
    expect(screen.getAllByText('37 unknown, 1 degree of freedom')[0]).toBeInTheDocument()
    expect(screen.getAllByText('Closed')[0]).toBeInTheDocument()
    expect(screen.getAllByText('Not worked out yet')[0]).toBeInTheDocument()
    const row = screen.getByRole('row', { name: /Salt section/ })
    expect(within(row).getAllByRole('img')[0]).toHaveAccessibleName(
      '10 given, 20 solvable now, 37 still unknown, 0 at odds',
    )
  })
})

describe('what may be done from the list', () => {
  it('archives, says so, and restores from the notice', async () => {
    actions.archiveBook.mockResolvedValue(ok({}))
    actions.restoreBook.mockResolvedValue(ok({}))
    render(<Toaster />)
    const user = show('engineer')
    await user.click(screen.getByRole('button', { name: 'Actions for Whey' }))
    await user.click(screen.getByRole('menuitem', { name: 'Archive' }))
    expect(actions.archiveBook).toHaveBeenCalledWith({ book: 'b4' })
    expect(await screen.findByText('Whey is archived.')).toBeInTheDocument()
    await user.click(screen.getByRole('button', { name: 'Restore' }))
    expect(actions.restoreBook).toHaveBeenCalledWith({ book: 'b4' })
    expect(await screen.findByText('Whey is back in Dairy.')).toBeInTheDocument()
  })

  it('says why a book was not put away', async () => {
    actions.archiveBook.mockResolvedValue(fail('notAllowed', 'Your role in this team is reader.'))
    render(<Toaster />)
    const user = show('engineer')
    await user.click(screen.getByRole('button', { name: 'Actions for Whey' }))
    await user.click(screen.getByRole('menuitem', { name: 'Archive' }))
    expect(await screen.findByText('Your role in this team is reader.')).toBeInTheDocument()
  })

  it('duplicates under a name of one’s own; a refusal stays beside the name', async () => {
    actions.duplicateBook.mockResolvedValueOnce(fail('conflict', 'This book is archived. Restore it first.'))
    actions.duplicateBook.mockResolvedValueOnce(ok({ id: 'b9' }))
    const user = show('engineer')
    await user.click(screen.getByRole('button', { name: 'Actions for Whey' }))
    await user.click(screen.getByRole('menuitem', { name: 'Duplicate' }))
    const name = screen.getByLabelText('Name of the copy')
    expect(name).toHaveValue('Whey, copy')
    await user.clear(name)
    await user.type(name, '  Whey, winter {Enter}')
    expect(actions.duplicateBook).toHaveBeenCalledWith({ book: 'b4', name: 'Whey, winter' })
    await waitFor(() => expect(name).toHaveAccessibleDescription(/archived/))
    await user.type(name, '{Enter}')
    await waitFor(() => expect(screen.queryByRole('dialog')).toBeNull())
  })

  it('refuses an empty name without asking the server', async () => {
    const user = show('owner')
    await user.click(screen.getByRole('button', { name: 'New project' }))
    await user.type(screen.getByLabelText('Name'), '   {Enter}')
    expect(screen.getByLabelText('Name')).toHaveAccessibleDescription('Type a name.')
    expect(actions.createProject).not.toHaveBeenCalled()
  })

  it('draws for a checker nothing that makes or puts away', () => {
    show('checker')
    expect(screen.queryByRole('button', { name: 'New book' })).toBeNull()
    expect(screen.queryByRole('button', { name: 'New project' })).toBeNull()
    expect(screen.queryByRole('button', { name: /^Actions for/ })).toBeNull()
    expect(screen.getByRole('link', { name: 'Whey' })).toBeVisible()
  })

  it('lets an engineer make books, and leaves projects to the owner', () => {
    show('engineer')
    expect(screen.getByRole('button', { name: 'New book' })).toBeVisible()
    expect(screen.queryByRole('button', { name: 'New project' })).toBeNull()
  })

  it('tells analysts and readers why their list is empty', () => {
    show('analyst', { books: [] })
    expect(screen.getByRole('heading', { name: 'Books are kept by the engineers' })).toBeVisible()
    expect(screen.getByText('You belong to Dairy and Salt works.')).toBeVisible()
    show('reader', { books: [], projects: [] })
    expect(screen.getByRole('heading', { name: 'No revision has been issued to you yet' })).toBeVisible()
    expect(screen.getByText(/belong to no project yet/)).toBeVisible()
  })
})

describe('a new book', () => {
  const open = async (role: Role = 'engineer') => {
    const user = show(role)
    await user.click(screen.getByRole('button', { name: 'New book' }))
    return user
  }

  it('blank: asks for a name, then makes it in its basis and unit and opens it', async () => {
    actions.createBook.mockResolvedValue(ok({ id: 'b7' }))
    const user = await open()
    await user.click(screen.getByRole('button', { name: 'Make the book' }))
    expect(screen.getByRole('alert')).toHaveTextContent('Type a name for the book.')
    expect(actions.createBook).not.toHaveBeenCalled()
    await user.type(screen.getByLabelText('Name'), 'Gas section')
    expect(screen.getByLabelText('Flow unit')).toHaveValue('t/d')
    await user.selectOptions(screen.getByLabelText('Basis'), 'mole')
    await user.selectOptions(screen.getByLabelText('Flow unit'), 'mol/s')
    await user.selectOptions(screen.getByLabelText('Project'), 'Salt works')
    await user.click(screen.getByRole('button', { name: 'Make the book' }))
    expect(actions.createBook).toHaveBeenCalledWith({
      projectId: 'p1',
      name: 'Gas section',
      from: { kind: 'blank', basis: 'mole', flowUnit: 'mol/s' },
    })
    await waitFor(() => expect(push).toHaveBeenCalledWith('/fennholt/books/b7'))
  })

  it('from a starter: has a name already and asks for no basis', async () => {
    actions.createBook.mockResolvedValue(ok({ id: 'b8' }))
    const user = await open()
    await user.click(screen.getByRole('radio', { name: /Biogas/ }))
    expect(screen.queryByLabelText('Basis')).toBeNull()
    await user.click(screen.getByRole('button', { name: 'Make the book' }))
    expect(actions.createBook).toHaveBeenCalledWith({
      projectId: 'p2',
      name: 'Biogas upgrading',
      from: { kind: 'starter', starter: 'biogas' },
    })
  })

  it('keeps what was typed when the server refuses', async () => {
    actions.createBook.mockResolvedValue(fail('notFound', 'There is no such project in this team.'))
    const user = await open()
    await user.type(screen.getByLabelText('Name'), 'Gas section')
    await user.click(screen.getByRole('button', { name: 'Make the book' }))
    expect(await screen.findByRole('alert')).toHaveTextContent('There is no such project in this team.')
    expect(screen.getByLabelText('Name')).toHaveValue('Gas section')
    expect(push).not.toHaveBeenCalled()
  })
})
