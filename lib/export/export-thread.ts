import { Worker, type WorkerOptions } from 'node:worker_threads'
import type { StreamTableRequest } from './stream-table-file'

/** Threads that wait for work, their code loaded: that takes longer than writing a small table. */
const idle: { worker: Worker; wake: () => void }[] = []
const idleMs = 60_000
const options: WorkerOptions = { resourceLimits: { maxOldGenerationSizeMb: 1536 } }

/** Set once it is known that this process runs from source, as tests and scripts do. */
let fromSource = false

/** Writes in a thread of its own; undefined where it took longer than `longestMs` and was stopped. */
export async function writeInThread(
  request: StreamTableRequest,
  longestMs: number,
): Promise<Uint8Array<ArrayBuffer> | undefined> {
  try {
    return await ask(takeThread(), request, longestMs)
  } catch (cause) {
    if (fromSource || !isUncompiled(cause)) throw cause
    fromSource = true
    return ask(takeThread(), request, longestMs)
  }
}

function takeThread(): Worker {
  const waiting = idle.at(-1)
  if (!waiting) return fromSource ? sourceWorker() : compiledWorker()
  waiting.wake()
  waiting.worker.ref()
  return waiting.worker
}

/** The bundler finds this form and compiles the worker: the address has to stand inside the call. */
const compiledWorker = (): Worker => new Worker(new URL('./export-worker.ts', import.meta.url), options)

/** Not compiled: the thread reads TypeScript by tsx, which has to be set up inside it. */
function sourceWorker(): Worker {
  const file = JSON.stringify(new URL('./export-worker.ts', import.meta.url).href)
  const script = `import('tsx/esm/api').then(({ register }) => { register(); return import(${file}) })`
  return new Worker(script, { ...options, eval: true })
}

const isUncompiled = (cause: unknown): boolean =>
  cause instanceof Error && (cause.cause as NodeJS.ErrnoException | undefined)?.code === 'ERR_UNKNOWN_FILE_EXTENSION'

function ask(
  worker: Worker,
  request: StreamTableRequest,
  longestMs: number,
): Promise<Uint8Array<ArrayBuffer> | undefined> {
  return new Promise((resolve, reject) => {
    // Listeners go one by one: removing all would take the worker's own along, and it would be deaf.
    const settle = (end: () => void): void => {
      clearTimeout(timer)
      worker.off('message', answered).off('error', failed).off('exit', ended)
      end()
    }
    const answered = (bytes: Uint8Array<ArrayBuffer>): void =>
      settle(() => {
        rest(worker)
        resolve(bytes)
      })
    const failed = (cause: unknown): void => settle(() => reject(new Error('The export thread failed', { cause })))
    const ended = (code: number): void =>
      settle(() => reject(new Error(`The export thread ended with code ${code} and no file`)))
    const timer = setTimeout(
      () =>
        settle(() => {
          void worker.terminate()
          resolve(undefined)
        }),
      longestMs,
    )
    worker.on('message', answered).on('error', failed).on('exit', ended)
    worker.postMessage(request)
  })
}

/** Keeps no process alive, and ends after a while without work. A thread that fails meanwhile is dropped, not the server. */
function rest(worker: Worker): void {
  const drop = (): void => {
    const at = idle.findIndex((one) => one.worker === worker)
    if (at >= 0) idle.splice(at, 1)
    clearTimeout(ends)
    worker.off('error', drop).off('exit', drop)
  }
  const ends = setTimeout(() => {
    drop()
    void worker.terminate()
  }, idleMs)
  ends.unref()
  worker.on('error', drop).on('exit', drop)
  worker.unref()
  idle.push({ worker, wake: drop })
}
