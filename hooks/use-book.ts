'use client'

import { useCallback, useEffect, useState, useSyncExternalStore } from 'react'
import useSWR from 'swr'
import type { Change } from '@/lib/book/change'
import type { BookRecord } from '@/lib/book/kinds'
import { stateOf } from '@/lib/book/state'
import { bookApi } from './book-api'
import type { BookHandle } from './book-handle'
import { BookStore } from './book-store'
import { editQueue } from './edit-queue'
import { useHistory } from './use-history'

export type OpenedBook = {
  id: string
  userId: string
  number: number
  records: readonly BookRecord[]
  mayEdit: boolean
}

/** Others' changes are looked for this often, and whenever the page comes back to the front. */
const LOOK_EVERY = 5_000

/** One sender per browser for one person's edits of one book, where the browser has Web Locks. */
function oneSender(name: string): <T>(work: () => Promise<T>) => Promise<T> {
  return (work) => ('locks' in navigator ? navigator.locks.request(name, work) : work())
}

function storeFor(book: OpenedBook): BookStore {
  return new BookStore(
    bookApi(book.id),
    editQueue(book.userId, book.id),
    { number: book.number, state: stateOf(book.records) },
    oneSender(`tallybrook:${book.userId}:${book.id}`),
  )
}

/** A book kept on the server: shows `apply(confirmed, pending)`, saves by itself, undoes one's own changes. */
export function useBook(book: OpenedBook, onRefused: (sentence: string) => void): BookHandle {
  const [store] = useState(() => storeFor(book))
  const { state, save } = useSyncExternalStore(store.subscribe, store.getSnapshot, store.getSnapshot)

  useEffect(() => {
    if (book.mayEdit) void store.resume()
    window.addEventListener('online', store.retry)
    return () => window.removeEventListener('online', store.retry)
  }, [store, book.mayEdit])

  useSWR(`/api/books/${book.id}/changes`, store.catchUp, {
    refreshInterval: LOOK_EVERY,
    revalidateOnFocus: true,
    revalidateOnMount: true,
    dedupingInterval: 1_000,
  })

  const current = useCallback(() => store.getSnapshot().state, [store])
  const { history, remember, forget } = useHistory({ current, write: store.edit }, onRefused)
  useEffect(() => {
    store.onDropped = forget
  }, [store, forget])
  const edit = useCallback(
    (change: Change): string | null => {
      if (!book.mayEdit) return 'You can read this book, but your role does not edit it.'
      const refused = store.edit(change)
      if (refused === null) remember(change)
      return refused
    },
    [store, remember, book.mayEdit],
  )
  return { state, mayEdit: book.mayEdit && save.status !== 'ended', save, edit, history }
}
