import { expect, it } from 'vitest'
import { Queue } from './queue'

it('runs so many at once, lets so many wait, and turns the rest away', async () => {
  const queue = new Queue(2, 1)
  const ends: (() => void)[] = []
  let running = 0
  let most = 0
  const work = () =>
    new Promise<string>((resolve) => {
      running += 1
      most = Math.max(most, running)
      ends.push(() => {
        running -= 1
        resolve('done')
      })
    })
  const [first, second, third] = [queue.run(work), queue.run(work), queue.run(work)]
  expect(queue.run(work)).toBeUndefined()
  await Promise.resolve()
  ends[0]?.()
  expect(await first).toBe('done')
  await new Promise((resolve) => setTimeout(resolve))
  ends[1]?.()
  ends[2]?.()
  expect(await Promise.all([second, third])).toEqual(['done', 'done'])
  expect(most).toBe(2)
})

it('goes on after a failure', async () => {
  const queue = new Queue(1, 1)
  await expect(queue.run(() => Promise.reject(new Error('broken')))).rejects.toThrow('broken')
  expect(await queue.run(() => Promise.resolve(7))).toBe(7)
})
