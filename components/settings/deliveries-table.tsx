import { When } from '@/components/books/when'
import { Tag, type TagTone } from '@/components/ui/tag'
import type { DeliveryView } from '@/lib/data/mail/list-deliveries'

type DeliveriesTableProps = { deliveries: readonly DeliveryView[]; most: number }

const states: Record<DeliveryView['state'], { tone: TagTone; words: string }> = {
  queued: { tone: 'quiet', words: 'On its way' },
  failed: { tone: 'given', words: 'Tried again soon' },
  sent: { tone: 'solvable', words: 'Sent' },
  'given up': { tone: 'atOdds', words: 'Given up' },
}

const head = 'border-b border-hair px-3 py-2 text-start font-normal text-ink-2'
const cell = 'border-b border-hair px-3 py-2.5 align-top max-sm:block max-sm:border-0 max-sm:py-0.5'

/** The mails that were sent in the team's name. What they say is not kept. */
export function DeliveriesTable({ deliveries, most }: DeliveriesTableProps) {
  return (
    <section aria-labelledby="mails" className="grid gap-3">
      <header>
        <h2 id="mails" className="text-lg">
          Mail sent
        </h2>
        <p className="text-ink-2">
          “Sent” means that the mail server took it; whether it was read is not known. What a mail says is not kept.
        </p>
      </header>
      {deliveries.length === 0 ? (
        <p>No mail was sent in the name of this team yet.</p>
      ) : (
        <div className="sheet overflow-hidden">
          <table className="w-full border-separate border-spacing-0 max-sm:block [&>tbody>tr:last-child>*]:border-b-0">
            <caption className="sr-only">Mails of the team, the newest first</caption>
            <thead className="max-sm:sr-only">
              <tr className="bg-rail">
                <th scope="col" className={head}>
                  To
                </th>
                <th scope="col" className={head}>
                  Subject
                </th>
                <th scope="col" className={head}>
                  State
                </th>
                <th scope="col" className={head}>
                  When
                </th>
              </tr>
            </thead>
            <tbody className="max-sm:block">
              {deliveries.map((mail) => (
                <tr
                  key={mail.id}
                  className="max-sm:block max-sm:border-b max-sm:border-hair max-sm:py-2.5 max-sm:last:border-b-0"
                >
                  <th scope="row" className={`${cell} text-start font-normal wrap-anywhere`}>
                    {mail.to}
                  </th>
                  <td className={`${cell} wrap-anywhere`}>{mail.subject}</td>
                  <td className={cell}>
                    <Tag tone={states[mail.state].tone}>{states[mail.state].words}</Tag>
                    {mail.attempts > 1 ? <span className="ms-2 text-sm text-ink-2">{mail.attempts} tries</span> : null}
                    {mail.lastError && mail.state !== 'sent' ? (
                      <span className="mt-1 block text-sm text-ink-2">{mail.lastError}</span>
                    ) : null}
                  </td>
                  <td className={`${cell} text-ink-2`}>
                    <When at={mail.sentAt ?? mail.createdAt} />
                  </td>
                </tr>
              ))}
            </tbody>
          </table>
        </div>
      )}
      {deliveries.length >= most ? <p className="text-ink-2">The newest {most} are shown.</p> : null}
    </section>
  )
}
