import Link from 'next/link'
import { buttonClasses } from '@/components/ui/button'
import { Caution } from '@/components/ui/caution'
import { solve } from '@/lib/balance'
import { LivePlant } from './live-plant'
import { typedAtFirst } from './plant'
import { viewPlant } from './plant-view'
import { StateKey } from './state-key'

export function FrontPage({ isSignedIn }: { isSignedIn: boolean }) {
  return (
    <>
      <main id="main" className="mx-auto w-full max-w-[1360px] px-5 sm:px-8">
        <div className="grid items-start gap-x-14 gap-y-9 pt-6 pb-12 lg:grid-cols-[minmax(0,5fr)_minmax(0,7fr)] lg:pt-12">
          <div className="lg:pt-6">
            <h1 className="text-[2.1rem] leading-[1.05] tracking-[-0.025em] sm:text-[3rem] lg:text-[2.9rem] xl:text-[3.2rem]">
              <span className="block">Type what you know. </span>
              <span className="block">See what follows.</span>
            </h1>
            <p className="mt-5 max-w-[46ch] text-md text-ink-2">
              Tallybrook is a live stream table for plants of many units, with their recycles and purges. Give it the
              flows and analyses that you have. It fills in each cell that follows from them, shows what is still
              unknown, and names the values that cannot all hold.
            </p>
            <p className="mt-3 max-w-[46ch] text-md text-ink-2">
              Each value that you give keeps its source, and the table goes out as a workbook whose closure can be
              checked.
            </p>
            <div className="mt-7 flex flex-wrap gap-2.5">
              {isSignedIn ? (
                <Link href="/home" prefetch={false} className={buttonClasses('main', 'large')}>
                  Go to your books
                </Link>
              ) : (
                <Link href="/sign-up" className={buttonClasses('main', 'large')}>
                  Make an account
                </Link>
              )}
              <Link href="/sample" className={buttonClasses('plain', 'large')}>
                Open the sample book
              </Link>
            </div>
          </div>
          <LivePlant first={viewPlant(typedAtFirst, solve)} />
        </div>
        <StateKey />
      </main>
      <footer className="mx-auto w-full max-w-[1360px] px-5 pt-8 pb-10 sm:px-8">
        <Caution full />
      </footer>
    </>
  )
}
