export default function Loading() {
  return (
    <div className="flex h-(--page-height) flex-col gap-2.5 px-5 pt-3 pb-2" aria-busy="true">
      <p className="text-ink-2">Opening the book …</p>
      <div className="sheet flex-1 animate-pulse" />
    </div>
  )
}
