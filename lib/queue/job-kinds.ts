import { z } from 'zod'

/** What a kind of job is: what it is given, and how the queue treats it. */
export type JobKind<P extends z.ZodType = z.ZodType> = {
  payload: P
  /** Tries after the first one. */
  retries: number
  /** Seconds before the second try; each later wait is about twice the one before. */
  retryAfterSeconds: number
  /** Taken for lost after so long, and tried again. */
  expiresAfterSeconds: number
  /** How many at a time in one server process. */
  atOnce: number
  /** How often a server looks for new ones. */
  lookEverySeconds: number
  /** For jobs that come round by themselves, with an empty payload: minute, hour, day, month, weekday, in UTC. */
  every?: string
}

const usual = { retries: 5, retryAfterSeconds: 30, expiresAfterSeconds: 300, atOnce: 1, lookEverySeconds: 2 }

/**
 * Every kind of job, by name. A new one gets a line here and a handler in lib/jobs/handlers.ts, which does not compile
 * without it. A payload holds ids, never content: it is kept in the clear for days.
 */
export const jobKinds = {
  /** Waits of 30 s to 8 h, 8 to 17 h in all: a mail server that is down overnight loses nothing. */
  'deliver-mail': {
    ...usual,
    payload: z.strictObject({ delivery: z.string().min(1) }),
    retries: 10,
    expiresAfterSeconds: 90,
    atOnce: 2,
    lookEverySeconds: 1,
  },
  'sweep-mail': { ...usual, payload: z.strictObject({}), every: '*/10 * * * *', lookEverySeconds: 30 },
} satisfies Record<string, JobKind>

export type JobName = keyof typeof jobKinds
export type JobPayload<N extends JobName> = z.output<(typeof jobKinds)[N]['payload']>

export const jobNames = Object.keys(jobKinds) as JobName[]
export const jobKind = (name: JobName): JobKind => jobKinds[name]
