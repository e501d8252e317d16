import { ColumnKind, type Model, otherPerOwn } from '../model'
import type { Row } from '../workings/book-rows'
import { Span } from '../workings/span'
import type { TypedCells } from './typed-cells'

/**
 * The unknowns of a boundary as a person counts them: of each crossing stream its flow F and its fractions x where they
 * are not typed, and extents. Places: F of stream s at s, x at nStreams + s nComponents + c, extents after them.
 */
export class Unknowns {
  readonly places: number[] = []
  private readonly isUnknown: Uint8Array
  private readonly size: Float64Array

  constructor(
    private readonly model: Model,
    private readonly typed: TypedCells,
    /** A generic solution, length nColumns. */
    private readonly point: Float64Array,
    crossing: readonly number[],
    extents: readonly number[],
  ) {
    const { nStreams, nComponents } = model
    const length = nStreams * (1 + nComponents) + model.reactions.length
    this.isUnknown = new Uint8Array(length)
    this.size = new Float64Array(length).fill(1)
    const add = (place: number, size: number): void => {
      this.places.push(place)
      this.isUnknown[place] = 1
      this.size[place] = Math.abs(size) || 1
    }
    for (const s of crossing) {
      const list = model.present[s] as number[]
      if (list.length === 0) continue
      if (!typed.flow[s]) add(s, this.flow(s))
      if (list.length > 1)
        for (const c of list) if (!typed.fraction[s * nComponents + c]) add(this.fractionPlace(s, c), 1)
    }
    for (const r of extents) add(nStreams * (1 + nComponents) + r, point[model.extentColumn[r] as number] as number)
  }

  get count(): number {
    return this.places.length
  }

  span(): Span {
    return new Span(this.size, new Uint8Array(this.size.length), true)
  }

  /** How many of the unknowns the equations in the span fix. */
  countCovered(span: Span): number {
    return this.places.filter((place) => span.covers([place], [1])).length
  }

  hasFraction(stream: number): boolean {
    return (this.model.present[stream] as number[]).some((c) => this.isUnknown[this.fractionPlace(stream, c)] === 1)
  }

  /** Fractions of a stream add up to 1; only those that are not typed stand in the row. */
  sumRow(stream: number): Pick<Row, 'columns' | 'values'> {
    const columns = (this.model.present[stream] as number[])
      .map((c) => this.fractionPlace(stream, c))
      .filter((place) => this.isUnknown[place])
    return { columns, values: columns.map(() => 1) }
  }

  /** One component's fraction is the same in two streams. */
  equality(a: number, b: number, component: number): Pick<Row, 'columns' | 'values'> {
    const both = [this.fractionPlace(a, component), this.fractionPlace(b, component)]
    const kept = both
      .map((place, k) => ({ place, value: k === 0 ? 1 : -1 }))
      .filter(({ place }) => this.isUnknown[place])
    return { columns: kept.map(({ place }) => place), values: kept.map(({ value }) => value) }
  }

  /** How a row over columns changes with the unknowns, at the generic solution. */
  gradient({ columns, values }: Row): Pick<Row, 'columns' | 'values'> {
    const { model } = this
    const { nStreams, nComponents } = model
    const sum = new Map<number, number>()
    const add = (place: number, value: number): void => {
      if (value !== 0 && this.isUnknown[place]) sum.set(place, (sum.get(place) ?? 0) + value)
    }
    const addPart = (s: number, c: number, a: number): void => {
      const single = (model.present[s] as number[]).length === 1
      add(s, single ? a : a * this.fraction(s, c))
      if (!single) add(this.fractionPlace(s, c), a * this.flow(s))
    }
    for (let k = 0; k < columns.length; k++) {
      const j = columns[k] as number
      const a = values[k] as number
      const place = this.placeOf(j)
      if (place.kind === 'part') addPart(place.stream, place.component, a)
      else if (place.kind === 'total') add(place.stream, a)
      else if (place.kind === 'extent') add(nStreams * (1 + nComponents) + place.reaction, a)
      else if (place.kind === 'other')
        for (const c of model.present[place.stream] as number[]) addPart(place.stream, c, a * otherPerOwn(model, c))
    }
    return { columns: [...sum.keys()], values: [...sum.values()] }
  }

  private fractionPlace(stream: number, component: number): number {
    return this.model.nStreams + stream * this.model.nComponents + component
  }

  private flow(stream: number): number {
    return this.typed.flowValue.get(stream) ?? (this.point[this.model.totalColumn[stream] as number] as number)
  }

  private fraction(stream: number, component: number): number {
    const at = stream * this.model.nComponents + component
    const typed = this.typed.fractionValue.get(at)
    if (typed !== undefined) return typed
    const total = this.point[this.model.totalColumn[stream] as number] as number
    return total === 0 ? 0 : (this.point[this.model.flowColumn[at] as number] as number) / total
  }

  private placeOf(
    column: number,
  ):
    | { kind: 'part'; stream: number; component: number }
    | { kind: 'total' | 'other'; stream: number }
    | { kind: 'extent'; reaction: number }
    | { kind: 'parameter' } {
    const { model } = this
    const { start } = this.typed
    switch (model.columnKind[column]) {
      case ColumnKind.componentFlow:
        return {
          kind: 'part',
          stream: start.streamOf[column] as number,
          component: start.componentOf[column] as number,
        }
      case ColumnKind.total:
        return { kind: 'total', stream: start.streamOf[column] as number }
      case ColumnKind.otherTotal:
        return { kind: 'other', stream: start.streamOf[column] as number }
      case ColumnKind.extent:
        return { kind: 'extent', reaction: model.extentColumn.indexOf(column) }
      default:
        return { kind: 'parameter' }
    }
  }
}
