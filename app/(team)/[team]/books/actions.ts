'use server'

import { perform } from '@/app/perform'
import type { NewBook } from '@/components/books/types'
import * as archive from '@/lib/data/book/archive-book'
import * as create from '@/lib/data/book/create-book'
import * as duplicate from '@/lib/data/book/duplicate-book'
import * as restore from '@/lib/data/book/restore-book'
import * as makeProject from '@/lib/data/project/create-project'
import * as nameProject from '@/lib/data/project/rename-project'

/** The small forms of the list of books. */
const shownAt = { path: '/[team]/books', kind: 'page' } as const

export async function createBook(team: string, input: NewBook) {
  return perform((ctx) => create.createBook(ctx, { team, ...input }), shownAt)
}

export async function duplicateBook(team: string, input: { book: string; name: string }) {
  return perform((ctx) => duplicate.duplicateBook(ctx, { team, ...input }), shownAt)
}

export async function archiveBook(team: string, input: { book: string }) {
  return perform((ctx) => archive.archiveBook(ctx, { team, ...input }), shownAt)
}

export async function restoreBook(team: string, input: { book: string }) {
  return perform((ctx) => restore.restoreBook(ctx, { team, ...input }), shownAt)
}

export async function createProject(team: string, input: { name: string }) {
  return perform((ctx) => makeProject.createProject(ctx, { team, ...input }), shownAt)
}

export async function renameProject(team: string, input: { project: string; name: string }) {
  return perform((ctx) => nameProject.renameProject(ctx, { team, ...input }), shownAt)
}
