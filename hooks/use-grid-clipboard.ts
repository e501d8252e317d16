import { type ClipboardEvent, useCallback, useRef } from 'react'
import type { GridSource } from './grid-model'
import type { GridCursor } from './use-grid-cursor'

/** Copy, cut and paste of blocks, as plain text and as a table, so that any spreadsheet program understands them. */
export function useGridClipboard(source: GridSource, cursor: GridCursor) {
  const latest = useRef({ source, cursor })
  latest.current = { source, cursor }
  const onCopy = useCallback((event: ClipboardEvent) => {
    const { source, cursor } = latest.current
    const { text, html } = source.copy(cursor.range)
    event.clipboardData.setData('text/plain', text)
    event.clipboardData.setData('text/html', html)
    event.preventDefault()
  }, [])
  const onCut = useCallback(
    (event: ClipboardEvent) => {
      onCopy(event)
      latest.current.source.clear(latest.current.cursor.range)
    },
    [onCopy],
  )
  const onPaste = useCallback((event: ClipboardEvent) => {
    const { source, cursor } = latest.current
    const data = { text: event.clipboardData.getData('text/plain'), html: event.clipboardData.getData('text/html') }
    event.preventDefault()
    if (data.text !== '' || data.html !== '') source.paste(cursor.range, data)
  }, [])
  return { onCopy, onCut, onPaste }
}
