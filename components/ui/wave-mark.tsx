/** The three waves. Decorative: the name stands beside it or in the link round it. */
export function WaveMark({ className }: { className?: string }) {
  return (
    <svg viewBox="0 0 28 24" className={className} aria-hidden="true" focusable="false">
      <path
        d="M4 4c5 0 5 4 10 4s5-4 10-4M4 10c5 0 5 4 10 4s5-4 10-4M4 16c5 0 5 4 10 4s5-4 10-4"
        fill="none"
        stroke="currentColor"
        strokeWidth="2.4"
        strokeLinecap="round"
      />
    </svg>
  )
}
