import { encode } from 'uqr'

/** A QR code, drawn here: what it holds goes nowhere. Dark on white in either theme, as readers expect. */
export function QrCode({ text, label }: { text: string; label: string }) {
  const { data, size } = encode(text, { ecc: 'M', border: 4 })
  const path = data.flatMap((row, y) => row.map((isDark, x) => (isDark ? `M${x} ${y}h1v1h-1z` : ''))).join('')
  return (
    <svg
      viewBox={`0 0 ${size} ${size}`}
      role="img"
      aria-label={label}
      shapeRendering="crispEdges"
      className="size-52 flex-none rounded-control border border-hair-2"
    >
      <path fill="#fff" d={`M0 0h${size}v${size}H0z`} />
      <path fill="#000" d={path} />
    </svg>
  )
}
