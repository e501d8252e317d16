import { classNames } from '@/components/ui/class-names'

const states = [
  { className: 'cell-given', sample: '1 200', word: 'Given', text: 'You typed it, and may say where it comes from.' },
  {
    className: 'cell-solvable',
    sample: '975',
    word: 'Solvable now',
    text: 'It has this one value, whatever else is true.',
  },
  { className: 'cell-unknown', sample: null, word: 'Still unknown', text: 'What is given does not settle it yet.' },
  { className: 'cell-at-odds', sample: '300', word: 'At odds', text: 'It clashes with other givens, which are named.' },
  { className: 'cell-absent', sample: '–', word: 'Absent', text: 'That component cannot be in that stream.' },
]

/** The five states of a cell, as the table draws them: told by fill and by mark, so they survive a grey print. */
export function StateKey() {
  return (
    <section aria-labelledby="state-key" className="border-t border-hair-2 pt-5 pb-4">
      <h2 id="state-key" className="text-md">
        A cell is in one of five states, and shows which while you type
      </h2>
      <ul className="mt-4 grid gap-x-7 gap-y-4 sm:grid-cols-2 lg:grid-cols-5">
        {states.map(({ className, sample, word, text }) => (
          <li
            key={word}
            className="grid grid-cols-[5.5rem_1fr] content-start items-start gap-x-3 lg:grid-cols-1 lg:gap-y-2"
          >
            <div
              aria-hidden="true"
              className={classNames(
                'h-[27px] w-[5.5rem] border border-hair px-2 font-mono text-sm leading-[25px]',
                sample !== null && sample !== '–' && 'text-end',
                className,
              )}
            >
              {sample ?? <span className="cell-mark">·</span>}
            </div>
            <div>
              <p className="font-semibold">{word}</p>
              <p className="text-ink-2">{text}</p>
            </div>
          </li>
        ))}
      </ul>
    </section>
  )
}
