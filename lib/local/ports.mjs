// @ts-check
import { createServer } from 'node:net'

/** @param {number} port @returns {Promise<boolean>} whether the port can be had on loopback */
export function isFree(port) {
  return new Promise((resolve) => {
    const probe = createServer()
    probe.once('error', () => resolve(false))
    probe.listen({ port, host: '127.0.0.1', exclusive: true }, () => probe.close(() => resolve(true)))
  })
}

/** The first of `preferred` that is free, else any. @param {(number | undefined)[]} preferred @returns {Promise<number>} */
export async function freePort(...preferred) {
  for (const port of preferred) if (port && (await isFree(port))) return port
  return new Promise((resolve, reject) => {
    const probe = createServer()
    probe.once('error', reject)
    probe.listen(0, '127.0.0.1', () => {
      const address = probe.address()
      probe.close(() => resolve(typeof address === 'object' && address ? address.port : 0))
    })
  })
}
