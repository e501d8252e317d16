'use client'

import { Dialog } from '@/components/ui/dialog'
import { measureTitle } from '@/lib/book/measures'
import type { BookView } from '../book-view'
import { ComponentFields } from '../card/component-card'
import type { Desk, DialogRequest } from '../desk'
import { AddForm, addWords } from './add-form'
import { MeasureForm } from './measure-form'
import { PresenceForm } from './presence-form'

type BenchDialogsProps = { request: DialogRequest | null; view: BookView; desk: Desk; onShut: () => void }

/** The dialogs of the workbench, one at a time. */
export function BenchDialogs({ request, view, desk, onShut }: BenchDialogsProps) {
  if (!request) return null
  const shared = { open: true, onOpenChange: (open: boolean) => open || onShut() }
  if (request.kind === 'add') {
    const words = addWords[request.what]
    return (
      <Dialog {...shared} title={words.title} description={words.hint}>
        <AddForm view={view} desk={desk} what={request.what} after={request.after} onDone={onShut} />
      </Dialog>
    )
  }
  if (request.kind === 'presence')
    return (
      <Dialog
        {...shared}
        width={view.components.length > 7 ? 'wide' : 'normal'}
        title="Which components can be in which stream"
        description="A component that cannot be in a stream is absent there: the balances know that its flow is none."
      >
        <PresenceForm view={view} desk={desk} streamId={request.streamId} />
      </Dialog>
    )
  if (request.kind === 'measure') {
    const measure = request.id === null ? undefined : view.state.measure.get(request.id)
    if (request.id !== null && !measure) return null
    return (
      <Dialog
        {...shared}
        title={measure ? `Row ${measureTitle(view.state, measure)}` : 'Add a row'}
        description="A measure of every stream: values can be typed in it like any other, and follow where they can."
      >
        <MeasureForm view={view} desk={desk} measure={measure} onDone={onShut} />
      </Dialog>
    )
  }
  const component = view.state.component.get(request.id)
  if (!component) return null
  return (
    <Dialog {...shared} width="narrow" title={`Component ${component.tag}`}>
      <ComponentFields view={view} desk={desk} component={component} />
    </Dialog>
  )
}
