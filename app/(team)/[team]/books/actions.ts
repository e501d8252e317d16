'use server'

import { revalidatePath } from 'next/cache'
import { headers } from 'next/headers'
import type { NewBook } from '@/components/books/types'
import { type Context, contextFrom } from '@/lib/auth/context'
import * as archive from '@/lib/data/book/archive-book'
import * as create from '@/lib/data/book/create-book'
import * as duplicate from '@/lib/data/book/duplicate-book'
import * as restore from '@/lib/data/book/restore-book'
import * as makeProject from '@/lib/data/project/create-project'
import * as nameProject from '@/lib/data/project/rename-project'
import type { Result } from '@/lib/errors'

/** The small forms of the list of books. Each calls one verb, which decides, and has the list read anew. */
async function perform<T>(verb: (ctx: Context) => Promise<Result<T>>): Promise<Result<T>> {
  const result = await verb(await contextFrom(await headers()))
  if (result.ok) {
    revalidatePath('/[team]/books', 'page')
    return result
  }
  // `detail` is for programs and logs; the browser needs the sentence and its places.
  const { detail: _, ...error } = result.error
  return { ok: false, error }
}

export async function createBook(team: string, input: NewBook) {
  return perform((ctx) => create.createBook(ctx, { team, ...input }))
}

export async function duplicateBook(team: string, input: { book: string; name: string }) {
  return perform((ctx) => duplicate.duplicateBook(ctx, { team, ...input }))
}

export async function archiveBook(team: string, input: { book: string }) {
  return perform((ctx) => archive.archiveBook(ctx, { team, ...input }))
}

export async function restoreBook(team: string, input: { book: string }) {
  return perform((ctx) => restore.restoreBook(ctx, { team, ...input }))
}

export async function createProject(team: string, input: { name: string }) {
  return perform((ctx) => makeProject.createProject(ctx, { team, ...input }))
}

export async function renameProject(team: string, input: { project: string; name: string }) {
  return perform((ctx) => nameProject.renameProject(ctx, { team, ...input }))
}
