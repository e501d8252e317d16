/** Everything that can be refused, and nothing else: a closed union, so a `switch` over it is checked by the compiler. */
export type ErrorCode =
  | 'notFound'
  | 'notAllowed'
  | 'signedOut'
  | 'badInput'
  | 'conflict'
  | 'tooMany'
  | 'unavailable'
  | 'internal'

/** One thing wrong with what was sent: where (`streams.2.name`, '' for the whole) and what, as a plain sentence. */
export type Issue = { path: string; what: string }

/** A refusal. `message` is a plain sentence for a person; `detail` is data for the program that asked (both values of a conflict). */
export type AppError = { code: ErrorCode; message: string; issues?: Issue[]; detail?: unknown }

/** What an operation that can be refused gives back. Exceptions are for bugs only. */
export type Result<T, E = AppError> = { ok: true; value: T } | { ok: false; error: E }

export function ok(): { ok: true; value: undefined }
export function ok<T>(value: T): { ok: true; value: T }
export function ok<T>(value?: T): { ok: true; value: T | undefined } {
  return { ok: true, value }
}

export function fail(
  code: ErrorCode,
  message: string,
  more: { issues?: Issue[]; detail?: unknown } = {},
): { ok: false; error: AppError } {
  return { ok: false, error: { code, message, ...more } }
}

type ZodLikeError = { issues: readonly { path: readonly PropertyKey[]; message: string }[] }

/** A failed zod parse as a refusal: each issue keeps its place. */
export function failParse(
  error: ZodLikeError,
  message = 'What was sent is not right.',
): { ok: false; error: AppError } {
  const issues = error.issues.map((issue) => ({ path: issue.path.map(String).join('.'), what: issue.message }))
  return fail('badInput', message, { issues })
}

const statusOf: Record<ErrorCode, number> = {
  badInput: 400,
  signedOut: 401,
  notAllowed: 403,
  notFound: 404,
  conflict: 409,
  tooMany: 429,
  internal: 500,
  unavailable: 503,
}

export function httpStatus(code: ErrorCode): number {
  return statusOf[code]
}
