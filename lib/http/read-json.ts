import { fail, ok, type Result } from '../errors'

const megabyte = 1_000_000

/**
 * The body of a request as JSON, at most `limit` bytes of it. Only `application/json` is taken: a form on another site
 * cannot send that without asking first, so a signed-in person's browser cannot be made to edit.
 */
export async function readJson(request: Request, limit = megabyte): Promise<Result<unknown>> {
  const type = request.headers.get('content-type')?.split(';')[0]?.trim().toLowerCase()
  if (type !== 'application/json') return fail('badInput', 'Send the body as application/json.')
  const tooLarge = fail('badInput', `The body is larger than ${limit / megabyte} MB. Send less at a time.`)
  if (Number(request.headers.get('content-length') ?? 0) > limit) return tooLarge
  const bytes = await readAtMost(request, limit)
  if (bytes === undefined) return tooLarge
  try {
    return ok(JSON.parse(new TextDecoder('utf-8', { fatal: true }).decode(bytes)) as unknown)
  } catch {
    return fail('badInput', 'The body is not valid JSON in UTF-8.')
  }
}

/** Stops reading as soon as the limit is passed: a length told in a header cannot be trusted. */
async function readAtMost(request: Request, limit: number): Promise<Uint8Array | undefined> {
  const reader = request.body?.getReader()
  const chunks: Uint8Array[] = []
  let length = 0
  while (reader) {
    const { done, value } = await reader.read()
    if (done) break
    length += value.byteLength
    if (length > limit) {
      await reader.cancel()
      return undefined
    }
    chunks.push(value)
  }
  const all = new Uint8Array(length)
  let at = 0
  for (const chunk of chunks) {
    all.set(chunk, at)
    at += chunk.byteLength
  }
  return all
}
