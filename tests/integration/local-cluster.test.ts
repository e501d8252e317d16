import { readFileSync, rmSync, statSync } from 'node:fs'
import path from 'node:path'
import pg from 'pg'
import { afterAll, expect, it } from 'vitest'
import { type Cluster, startCluster } from '@/lib/local/postgres-cluster.mjs'
import { applicationDatabase } from '@/lib/local/postgres-databases.mjs'
import { throwAwayHome } from '@/lib/local/postgres-home.mjs'

const home = throwAwayHome()
let cluster: Cluster | undefined
afterAll(() => {
  cluster?.stop()
  rmSync(home.folder, { recursive: true, force: true })
})

async function ask(url: string, query: string): Promise<unknown[]> {
  const client = new pg.Client({ connectionString: url })
  client.on('error', () => {})
  await client.connect()
  try {
    return (await client.query(query)).rows
  } finally {
    await client.end()
  }
}

const postmaster = () => Number.parseInt(readFileSync(path.join(home.data, 'postmaster.pid'), 'utf8'), 10)

it('keeps what was written through a stop, and through a server that is killed', { timeout: 60_000 }, async () => {
  cluster = await startCluster(home)
  const url = await applicationDatabase(cluster)
  expect(await ask(url, 'show fsync')).toEqual([{ fsync: 'on' }])
  await ask(url, 'create table kept (x int)')
  await ask(url, 'insert into kept values (7)')

  cluster.stop()
  cluster = await startCluster(home)
  expect(await ask(await applicationDatabase(cluster), 'select x from kept')).toEqual([{ x: 7 }])

  process.kill(postmaster(), 'SIGKILL')
  cluster = await startCluster(home)
  expect(await ask(await applicationDatabase(cluster), 'select x from kept')).toEqual([{ x: 7 }])
})

it('uses a server that an earlier start left running', async () => {
  const first = cluster ?? (await startCluster(home))
  const before = postmaster()
  cluster = await startCluster(home)
  expect(postmaster()).toBe(before)
  expect(cluster.port).toBe(first.port)
})

it('lets nobody in without the password, and the application not beyond its database', async () => {
  cluster ??= await startCluster(home)
  const url = await applicationDatabase(cluster)
  await expect(ask(url.replace(/:[0-9a-f]{64}@/, ':guess@'), 'select 1')).rejects.toThrow(/password/)
  await expect(ask(url, 'create role other')).rejects.toThrow(/permission denied/)
  expect(statSync(path.join(home.folder, 'credentials.json')).mode & 0o777).toBe(0o600)
})
