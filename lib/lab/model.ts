/** What the reading of laboratory tables gives back, in the words of the format tallybrook-lab/1. */

export type DecimalSign = 'point' | 'comma'
export type DateOrder = 'dmy' | 'mdy'
export type LabShape = 'wide' | 'transposed' | 'long'

/** Answers to questions asked before; without them the table's own evidence decides. */
export type LabOptions = { decimal?: DecimalSign; dates?: DateOrder }

export type ResultKind =
  | 'value'
  | 'below'
  | 'above'
  | 'about'
  | 'notDetected'
  | 'trace'
  | 'notAnalysed'
  | 'difference'
  | 'blank'
  | 'unclear'

export type LabResult = {
  analyte: string
  /** What the analyte is reckoned as: "P2O5" of "P as P2O5". */
  as?: string
  /** In totals that run over samples: whose total it is. */
  sample?: string
  raw: string
  kind: ResultKind
  value?: number
  limit?: number
  /** In the unit of the value, as the table gives it; a relative one is already multiplied out. */
  uncertainty?: number
  unit?: string
  basis?: string
  flag?: string
}

export type LabSample = {
  id: string
  replicateOf?: string
  stream?: string
  /** ISO; the date alone where no time is given. */
  takenAt?: string
  note: string
  method?: string
  results: LabResult[]
}

export type LabTotal = { label: string; results: LabResult[] }
export type LabQuestion = { code: 'decimal' | 'dates' | 'basis' | 'unit'; where: string[]; options: string[] }

/** A filled cell with no place: row and column from 1, rows as lines of the file or rows of the sheet. */
export type LabPlace = { sheet?: string; row: number; column: number; raw: string }

export type LabReading = {
  format: 'tallybrook-lab/1'
  shape: LabShape
  /** null where it is asked. */
  decimal: DecimalSign | null
  samples: LabSample[]
  totals: LabTotal[]
  questions: LabQuestion[]
  notUnderstood: LabPlace[]
  /** Titles, foot lines and heads: read past, kept for the preview. Not part of the file format. */
  passedOver: LabPlace[]
}

/** `problems`: plain sentences, one a problem. */
export type LabAnswer = { ok: true; reading: LabReading } | { ok: false; problems: string[] }
