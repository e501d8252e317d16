import { parentPort } from 'node:worker_threads'
import { type StreamTableRequest, streamTableFile } from './stream-table-file'

/** One export a message: the bytes go back. A fault ends the thread, with its cause to the one who asked. */
parentPort?.on('message', async (request: StreamTableRequest) => {
  const bytes = await streamTableFile(request)
  parentPort?.postMessage(bytes, [bytes.buffer])
})
