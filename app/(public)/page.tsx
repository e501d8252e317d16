import { headers } from 'next/headers'
import { FrontHeader } from '@/components/front/front-header'
import { FrontPage } from '@/components/front/front-page'
import { contextFrom } from '@/lib/auth/context'

export default async function Page() {
  const { userId } = await contextFrom(await headers())
  return (
    <>
      <FrontHeader isSignedIn={userId !== null} />
      <FrontPage isSignedIn={userId !== null} />
    </>
  )
}
