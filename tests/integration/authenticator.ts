import { createHmac } from 'node:crypto'

const letters = 'ABCDEFGHIJKLMNOPQRSTUVWXYZ234567'

function fromBase32(text: string): Buffer {
  const bits = [...text].map((letter) => letters.indexOf(letter).toString(2).padStart(5, '0')).join('')
  return Buffer.from((bits.match(/.{8}/g) ?? []).map((byte) => Number.parseInt(byte, 2)))
}

/** The code that an authenticator shows for an otpauth address: RFC 6238 with SHA-1, 6 digits, 30 s. */
export function codeFor(address: string, at = Date.now()): string {
  const url = new URL(address)
  if (url.protocol !== 'otpauth:') throw new Error(`${address} is no otpauth address`)
  const counter = Buffer.alloc(8)
  counter.writeBigUInt64BE(BigInt(Math.floor(at / 30_000)))
  const hash = createHmac('sha1', fromBase32(url.searchParams.get('secret') ?? ''))
    .update(counter)
    .digest()
  const offset = (hash.at(-1) ?? 0) & 15
  return String((hash.readUInt32BE(offset) & 0x7fffffff) % 1_000_000).padStart(6, '0')
}
