/** Branded ids: a stream's id cannot stand where a component's is wanted. Unique within one book. */
type Brand<Name extends string> = string & { readonly __brand?: Name }

export type BookId = Brand<'book'>
export type StreamId = Brand<'stream'>
export type ComponentId = Brand<'component'>
export type UnitId = Brand<'unit'>
export type ReactionId = Brand<'reaction'>
export type RuleId = Brand<'rule'>
export type ParameterId = Brand<'parameter'>
export type MeasureId = Brand<'measure'>
export type CaseId = Brand<'case'>

const ALPHABET = '0123456789abcdefghjkmnpqrstvwxyz'

/** A fresh record id: 16 characters, 80 random bits. */
export function newId(): string {
  const bytes = crypto.getRandomValues(new Uint8Array(16))
  let id = ''
  for (const byte of bytes) id += ALPHABET[byte & 31]
  return id
}

/** Ids of records whose place is their identity, so that two people filling one place meet in one record. */
export const absenceId = (stream: StreamId, component: ComponentId): string => `${stream}/${component}`
export const linkId = (stream: StreamId, direction: 'in' | 'out'): string => `${stream}/${direction}`
export const coefficientId = (reaction: ReactionId, component: ComponentId): string => `${reaction}/${component}`
export const ruleStreamId = (rule: RuleId, stream: StreamId): string => `${rule}/${stream}`
export const measurePartId = (measure: MeasureId, side: string, component: ComponentId): string =>
  `${measure}/${side}/${component}`
/** `of`: what of the stream, a component or a row's measure. */
export const givenId = (
  caseId: CaseId,
  stream: StreamId,
  quantity: string,
  of: ComponentId | MeasureId | null,
  instrument = 'main',
): string => [caseId, stream, quantity, of ?? '', instrument].join('/')
