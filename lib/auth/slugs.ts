/** Names that a team cannot have in its address, because a page of ours has it or may get it. */
const reserved = new Set(
  (
    'about account accounts admin api app assets auth billing blog book books console contact dashboard demo dev docs ' +
    'download downloads embed errors export favicon feedback files fonts guide health help home icon icons images import ' +
    'index info invitation invitations invite join jobs lab legal licence license live local login logout mail me new news ' +
    'next not-found pages password people pricing print privacy profile project projects public readings register reset ' +
    'revision revisions robots root sample search security settings share shared sign-in sign-out sign-up sitemap static ' +
    'status support system tallybrook team teams terms test tests token tokens tour user users v1 v2 verify welcome ' +
    'well-known workbench www'
  ).split(' '),
)

const shape = /^[a-z0-9]+(-[a-z0-9]+)*$/
export const longestSlug = 48

/** Whether the first part of an address can be a team. */
export function isTeamSlug(value: string): boolean {
  return value.length <= longestSlug && shape.test(value) && !reserved.has(value)
}

/** "Ada Lovelace" -> "ada-lovelace". Letters that have no plain form are left out; with none left it is "new-team". */
export function slugFrom(name: string): string {
  const plain = name
    .normalize('NFKD')
    .replace(/[\u0300-\u036f]/g, '')
    .toLowerCase()
    .replace(/['’]/g, '')
    .replace(/[^a-z0-9]+/g, '-')
    .slice(0, longestSlug - 8)
    .replace(/^-+|-+$/g, '')
  if (plain === '') return 'new-team'
  return reserved.has(plain) ? `${plain}-team` : plain
}
