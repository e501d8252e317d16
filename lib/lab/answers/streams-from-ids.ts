import type { LabSample } from '../model'

const WITH_STREAM = /^\D.*[ _]?\((\d{2,5}[A-Za-z]?)\)$/

/** Samples that all name their stream in their id, "Product (407)", where no column does. */
export function readStreamsFromIds(samples: LabSample[]): void {
  const streams = samples.map(({ id, stream }) => (stream === undefined ? WITH_STREAM.exec(id)?.[1] : undefined))
  if (streams.some((stream) => stream === undefined)) return
  for (const [at, sample] of samples.entries()) {
    const { id, replicateOf, ...rest } = sample
    for (const key of Object.keys(sample) as (keyof LabSample)[]) delete (sample as Partial<LabSample>)[key]
    Object.assign(sample, { id, ...(replicateOf !== undefined && { replicateOf }), stream: streams[at] }, rest)
  }
}
