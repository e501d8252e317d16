import Link from 'next/link'
import { buttonClasses } from '@/components/ui/button'
import { WaveMark } from '@/components/ui/wave-mark'
import { ThemeSwitch } from './theme-switch'

type FrontHeaderProps = { isSignedIn: boolean /** The sign pages lead to each other in their text. */; bare?: boolean }

export function FrontHeader({ isSignedIn, bare }: FrontHeaderProps) {
  return (
    <header className="mx-auto flex w-full max-w-[1360px] items-center gap-2 px-5 py-3.5 sm:px-8">
      <Link href="/" className="me-auto flex items-center gap-2.5 rounded-md">
        <WaveMark className="w-7 text-brook" />
        <span className="font-heading text-lg font-semibold tracking-tight">Tallybrook</span>
      </Link>
      <ThemeSwitch />
      {bare ? null : isSignedIn ? (
        <Link href="/home" prefetch={false} className={buttonClasses('main')}>
          Go to your books
        </Link>
      ) : (
        <>
          <Link href="/sign-in" className={buttonClasses('quiet')}>
            Sign in
          </Link>
          <Link href="/sign-up" className={buttonClasses('main', 'normal', 'max-sm:hidden')}>
            Make an account
          </Link>
        </>
      )}
    </header>
  )
}
