import { createHash, randomBytes } from 'node:crypto'

/** A secret for a link in a mail: 256 random bits, in letters that a link may hold. */
export const newToken = (): string => randomBytes(32).toString('base64url')

/** What is kept of it. It is random, so a plain hash cannot be undone by guessing. */
export const hashOfToken = (token: string): string => createHash('sha256').update(token).digest('base64url')
