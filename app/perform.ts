import { revalidatePath } from 'next/cache'
import { headers } from 'next/headers'
import { type Context, contextFrom } from '@/lib/auth/context'
import type { Result } from '@/lib/errors'

/** What small forms do: one verb, which decides, in the name of who asks; then what shows it is read anew. */
export async function perform<T>(
  verb: (ctx: Context) => Promise<Result<T>>,
  shownAt?: { path: string; kind: 'page' | 'layout' },
): Promise<Result<T>> {
  const result = await verb(await contextFrom(await headers()))
  if (result.ok) {
    if (shownAt) revalidatePath(shownAt.path, shownAt.kind)
    return result
  }
  // `detail` is for programs and logs; the browser needs the sentence and its places.
  const { detail: _, ...error } = result.error
  return { ok: false, error }
}
