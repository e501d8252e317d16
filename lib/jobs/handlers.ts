import { logger } from '@/lib/http/logger'
import { deliverMail } from '@/lib/mail/deliver-mail'
import { giveUpStale } from '@/lib/mail/deliveries'
import type { JobName, JobPayload } from '@/lib/queue/job-kinds'

/** Which try this is. A handler that throws is tried again, unless this was the last. */
export type JobRun = { isLastTry: boolean }

export type Handlers = { [N in JobName]: (payload: JobPayload<N>, run: JobRun) => Promise<void> }

/** What is done for each kind of job. A handler may run twice for one job and has to bear it. */
export const handlers: Handlers = {
  'deliver-mail': ({ delivery }, run) => deliverMail(delivery, run),
  'sweep-mail': async () => {
    const count = await giveUpStale()
    if (count > 0) logger().warn({ count }, 'mails given up that could not be sent in time')
  },
}
