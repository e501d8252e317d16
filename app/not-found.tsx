import Link from 'next/link'
import { buttonClasses } from '@/components/ui/button'
import { EmptyState } from '@/components/ui/empty-state'
import { WaveMark } from '@/components/ui/wave-mark'

export const metadata = { title: 'Not found' }

export default function NotFound() {
  return (
    <main id="main" className="mx-auto max-w-2xl pt-[10vh]">
      <Link href="/" className="ms-5 inline-flex items-center gap-2.5 rounded-md sm:ms-8">
        <WaveMark className="w-7 text-brook" />
        <span className="font-heading text-lg font-semibold">Tallybrook</span>
      </Link>
      <EmptyState
        level={1}
        title="There is nothing at this address"
        actions={
          <Link href="/home" prefetch={false} className={buttonClasses('main')}>
            Go to your books
          </Link>
        }
      >
        <p>
          It may have been moved or archived, the address may be mistyped, or it belongs to a team or project that you
          are not in. Someone who is can let you in.
        </p>
      </EmptyState>
    </main>
  )
}
