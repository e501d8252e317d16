import { createCipheriv, createDecipheriv, hkdfSync, randomBytes } from 'node:crypto'

/**
 * What a waiting mail says, unreadable in the database and in its backups: a reset link is as good as a password.
 * AES-256-GCM under a key of this purpose's own, derived from the server's secret; bound to the id of its delivery.
 */
export function seal(text: string, delivery: string, secret: string): string {
  const iv = randomBytes(12)
  const cipher = createCipheriv('aes-256-gcm', keyFrom(secret), iv).setAAD(Buffer.from(delivery))
  const sealed = Buffer.concat([cipher.update(text, 'utf8'), cipher.final()])
  return Buffer.concat([iv, cipher.getAuthTag(), sealed]).toString('base64url')
}

/** Null when it was sealed for another delivery or under another secret, or was changed since. */
export function unseal(sealed: string, delivery: string, secret: string): string | null {
  const bytes = Buffer.from(sealed, 'base64url')
  if (bytes.length < 28) return null
  const decipher = createDecipheriv('aes-256-gcm', keyFrom(secret), bytes.subarray(0, 12), { authTagLength: 16 })
  decipher.setAAD(Buffer.from(delivery)).setAuthTag(bytes.subarray(12, 28))
  try {
    return Buffer.concat([decipher.update(bytes.subarray(28)), decipher.final()]).toString('utf8')
  } catch {
    return null
  }
}

function keyFrom(secret: string): Buffer {
  return Buffer.from(hkdfSync('sha256', secret, '', 'tallybrook: content of waiting mails', 32))
}
