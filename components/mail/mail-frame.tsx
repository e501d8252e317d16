/** No scripts, nothing fetched, and links open beside this page, never in it. */
const rules =
  `<meta http-equiv="Content-Security-Policy" content="default-src 'none'; style-src 'unsafe-inline'">` +
  '<base target="_blank">'

/** A mail's HTML, kept apart from this page: it runs no scripts and is of no origin. */
export function MailFrame({ html, title }: { html: string; title: string }) {
  return (
    <iframe
      title={title}
      sandbox="allow-popups allow-popups-to-escape-sandbox"
      srcDoc={html.replace(/<head>/i, (head) => head + rules)}
      className="h-[46rem] w-full rounded-sheet border border-hair bg-white"
    />
  )
}
