import { type LabOptions, type LabReading, type LabResult, readLabText } from '@/lib/lab'

/** The reading of a text that must be readable. */
export function readingOf(text: string, options?: LabOptions): LabReading {
  const answer = readLabText(text, options)
  if (!answer.ok) throw new Error(answer.problems.join(' '))
  return answer.reading
}

/** A result in one line: kind, number, uncertainty, unit, basis, flag: "value 5.2 ±0.1 mg/L dry *". */
export function inWords(result: LabResult): string {
  const number = result.value ?? result.limit
  return [
    result.kind,
    number,
    result.uncertainty !== undefined ? `±${result.uncertainty}` : undefined,
    result.unit,
    result.as && `as ${result.as}`,
    result.basis,
    result.flag,
  ]
    .filter((part) => part !== undefined)
    .join(' ')
}

/** Samples as { id: { analyte: words } }; a replicate's key is "id ~ common id". */
export function tableOf(reading: LabReading): Record<string, Record<string, string>> {
  return Object.fromEntries(
    reading.samples.map((sample) => [
      sample.replicateOf === undefined ? sample.id : `${sample.id} ~ ${sample.replicateOf}`,
      Object.fromEntries(sample.results.map((result) => [result.analyte, inWords(result)])),
    ]),
  )
}
