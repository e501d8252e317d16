import { preliminary } from './caution'

/** Fields of ISO 7200 (legal owner, number, revision, date, title, creator, checker, approver, type) and case and basis. */
export type TitleBlock = {
  owner: string
  project: string
  title: string
  documentNumber: string
  revision: string
  /** Date of issue, or null while nothing is issued. */
  issued: string | null
  /** Day on which the file was made, year-month-day. */
  made: string
  creator: string
  checked: string | null
  approved: string | null
  documentType: string
  caseName: string
  basis: string
}

export const statusOf = (title: TitleBlock): string => (title.issued === null ? preliminary : `Issued ${title.issued}`)

/** Label and value of each field, in reading order. */
export function titleFields(title: TitleBlock): [label: string, value: string][] {
  return [
    ['Owner', title.owner],
    ['Document number', title.documentNumber || 'not numbered'],
    ['Case', title.caseName],
    ['Project', title.project],
    ['Revision', title.revision],
    ['Basis', title.basis],
    ['Document type', title.documentType],
    ['Date of issue', title.issued ?? `not issued (made ${title.made})`],
    ['Creator', title.creator],
    ['Sheet', '1 of 4'],
    ['Checked', title.checked ?? 'not checked'],
    ['Approved', title.approved ?? 'not approved'],
  ]
}
