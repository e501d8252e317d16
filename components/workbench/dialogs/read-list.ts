import { type RecordOf, unitKinds } from '@/lib/book/kinds'
import { parseTsv } from '@/lib/sheet/clipboard'
import { type DecimalSign, readNumber } from '@/lib/sheet/read-number'

export type ListItem = Partial<
  Pick<RecordOf<'component'>, 'tag' | 'name' | 'formula' | 'molarMass'> & Pick<RecordOf<'unit'>, 'unitKind'>
>

/** A pasted list, one on each line; or a sentence about the first line that cannot be read. */
export function readList(
  what: 'stream' | 'component' | 'unit',
  text: string,
  decimal: DecimalSign,
): ListItem[] | string {
  const items: ListItem[] = []
  for (const [index, cells] of parseTsv(text).entries()) {
    const [tag = '', name = '', third = '', fourth = '', ...more] = cells.map((cell) => cell.trim())
    if ([tag, name, third, fourth, ...more].every((cell) => cell === '')) continue
    const item: ListItem = { ...(tag === '' ? {} : { tag }), ...(name === '' ? {} : { name }) }
    const line = `Line ${index + 1}`
    if (tag.length > 40) return `${line}: the tag “${tag.slice(0, 20)}…” is longer than 40 characters.`
    if (what === 'component') {
      if (third !== '') item.formula = third
      if (fourth !== '') {
        const number = readNumber(fourth, decimal)
        if (!number.ok) return `${line}: ${number.reason}`
        if (number.rest !== '' || number.value <= 0) return `${line}: “${fourth}” is no molar mass in kg/kmol.`
        item.molarMass = number.value
      }
    }
    if (what === 'unit' && third !== '') {
      const kind = unitKinds.find((one) => one === third.toLowerCase())
      if (!kind) return `${line}: “${third}” is no kind of unit: ${unitKinds.join(', ')}.`
      item.unitKind = kind
    }
    items.push(item)
  }
  return items
}
