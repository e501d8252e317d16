import type { Metadata } from 'next'
import { DeliveriesTable } from '@/components/settings/deliveries-table'
import { TeamRoom } from '@/components/settings/team-room'
import { listDeliveries } from '@/lib/data/mail/list-deliveries'
import { openTeam, valueFor } from '../../open-team'

export const metadata: Metadata = { title: 'Mail sent' }

const most = 200

export default async function MailPage({ params }: PageProps<'/[team]/settings/mail'>) {
  const { team: slug } = await params
  const path = `/${slug}/settings/mail`
  const { ctx, team } = await openTeam(slug, path)
  const deliveries = valueFor(await listDeliveries(ctx, { team: slug, limit: most }), path)
  return (
    <TeamRoom team={team} room="mail">
      <DeliveriesTable deliveries={deliveries} most={most} />
    </TeamRoom>
  )
}
