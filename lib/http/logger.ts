import pino, { type DestinationStream, type Logger } from 'pino'
import { env } from '../env'
import { currentRequestId } from './request-scope'

/** Never written out, wherever they turn up in what is logged. */
const secrets = ['password', 'token', 'secret', 'authorization', 'cookie']

/** One JSON object a line; inside a request each line carries its `requestId`. */
export function makeLogger(level: string, destination?: DestinationStream): Logger {
  return pino(
    {
      level,
      base: null,
      timestamp: pino.stdTimeFunctions.isoTime,
      formatters: { level: (label) => ({ level: label }) },
      serializers: { err: pino.stdSerializers.errWithCause },
      redact: { paths: secrets.flatMap((name) => [name, `*.${name}`]), censor: '(not shown)' },
      mixin: () => {
        const requestId = currentRequestId()
        return requestId === undefined ? {} : { requestId }
      },
    },
    destination ?? pino.destination(1),
  )
}

let shared: Logger | undefined

/** The logger of this process, made on first use so that loading a module reads no settings. */
export function logger(): Logger {
  shared ??= makeLogger(env.logLevel)
  return shared
}
