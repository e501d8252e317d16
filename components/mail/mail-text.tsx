/** Plain text as it is, with its addresses as links. */
export function MailText({ text }: { text: string }) {
  const pieces = text.split(/(https?:\/\/[^\s<>"]+)/)
  return (
    <pre className="sheet overflow-x-auto p-4 font-mono text-sm whitespace-pre-wrap">
      {pieces.map((piece, place) =>
        place % 2 === 1 ? (
          <a key={place} href={piece} className="link break-all">
            {piece}
          </a>
        ) : (
          piece
        ),
      )}
    </pre>
  )
}
