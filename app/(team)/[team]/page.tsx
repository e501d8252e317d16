import { redirect } from 'next/navigation'

export default async function TeamPage({ params }: PageProps<'/[team]'>) {
  redirect(`/${(await params).team}/books`)
}
