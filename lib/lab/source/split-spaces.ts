import type { Cell } from '../table/grid'

/** A field of a line with the places it covers. */
type Field = { text: string; from: number; to: number }
type Range = { from: number; to: number }

const FIELD = /"(?:[^"]|"")*"(?= {2}|\s*$)|\S+(?: \S+)*/g

/** The fields of a line parted by two and more spaces; quoted ones may hold such spaces. */
export function spacedFields(line: string): Field[] {
  return [...line.matchAll(FIELD)].map((found) => {
    const quoted = /^"([\s\S]*)"$/.exec(found[0])?.[1]
    return {
      text: quoted === undefined ? found[0] : quoted.replaceAll('""', '"'),
      from: found.index,
      to: found.index + found[0].length,
    }
  })
}

/**
 * Lines as rows. Lines with the usual number of fields give the columns' places; in the others each field goes
 * to the column it stands under, so that a blank cell shifts nothing. Where the fields do not stand in columns: by order.
 */
export function splitBySpaces(lines: string[]): Cell[][] {
  const rows = lines.map(spacedFields)
  const usual = usualCount(rows.map((fields) => fields.length))
  const ranges = columnRanges(rows, usual)
  return rows.map((fields) =>
    fields.length === usual && ranges?.length === usual
      ? fields.map((field) => field.text)
      : ranges
        ? byPlace(fields, ranges)
        : fields.map((field) => field.text),
  )
}

/** The most frequent count from 2 up; the larger of equally frequent ones. */
export function usualCount(counts: number[]): number {
  const often = new Map<number, number>()
  for (const count of counts) if (count > 1) often.set(count, (often.get(count) ?? 0) + 1)
  let usual = 0
  let most = 0
  for (const [count, times] of often)
    if (times > most || (times === most && count > usual)) [usual, most] = [count, times]
  return usual
}

function columnRanges(rows: Field[][], usual: number): Range[] | undefined {
  const ranges: Range[] = Array.from({ length: usual }, () => ({ from: Number.POSITIVE_INFINITY, to: 0 }))
  for (const fields of rows)
    if (fields.length === usual)
      for (const [at, field] of fields.entries()) {
        const range = ranges[at] as Range
        range.from = Math.min(range.from, field.from)
        range.to = Math.max(range.to, field.to)
      }
  if (ranges.some((range, at) => at > 0 && range.from < (ranges[at - 1] as Range).to)) return undefined
  for (const fields of rows)
    if (fields.length > usual)
      for (const field of fields)
        if (ranges.length < 500 && !ranges.some((range) => field.from < range.to + 1 && range.from < field.to + 1))
          ranges.push({ from: field.from, to: field.to })
  return ranges.sort((left, right) => left.from - right.from)
}

function byPlace(fields: Field[], ranges: Range[]): Cell[] {
  const row: string[] = ranges.map(() => '')
  for (const field of fields) {
    let best = 0
    let most = Number.NEGATIVE_INFINITY
    for (const [at, range] of ranges.entries()) {
      const overlap = Math.min(field.to, range.to) - Math.max(field.from, range.from)
      // A head that covers two columns belongs to the one it starts with.
      const score = range.from === field.from ? 1e6 : overlap
      if (score > most) [best, most] = [at, score]
    }
    row[best] = row[best] === '' ? field.text : `${row[best]}  ${field.text}`
  }
  return row
}
