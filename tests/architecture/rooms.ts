/** A part of the house: the files in it, the other rooms it may call, and those it may take types from alone. */
export type Room = { name: string; holds: RegExp; calls: string[]; typesFrom?: string[] }

const ground = ['lib/env', 'lib/errors', 'lib/http']
const pure = ['lib/balance', 'lib/book', 'lib/sheet', 'lib/lab', 'lib/errors']

/** From the street down to the cellar. A file belongs to the first room that holds it; tests may call everything. */
export const rooms: Room[] = [
  { name: 'tests', holds: /^tests\/|\.test\.tsx?$/, calls: ['*'] },
  {
    name: 'app',
    holds: /^app\/|^(proxy|instrumentation)\.ts$/,
    calls: [
      'components',
      'hooks',
      'lib/data',
      'lib/auth',
      'lib/export',
      'lib/files',
      'lib/jobs',
      'lib/mail',
      ...ground,
      ...pure,
    ],
    typesFrom: ['db'],
  },
  {
    name: 'components',
    holds: /^components\//,
    calls: ['hooks', 'lib/auth', 'lib/export', 'lib/http', ...pure],
    typesFrom: ['db', 'lib/data'],
  },
  { name: 'hooks', holds: /^hooks\//, calls: ['lib/auth', 'lib/export', ...pure], typesFrom: ['db', 'lib/data'] },
  { name: 'lib/cli', holds: /^lib\/cli\//, calls: ['lib/export', ...pure] },
  { name: 'db/seed', holds: /^db\/seed\/.*\.ts$/, calls: ['db', 'lib/data', 'lib/auth', ...ground, ...pure] },
  {
    name: 'lib/jobs',
    holds: /^lib\/jobs\//,
    calls: ['lib/data', 'lib/export', 'lib/files', 'lib/mail', 'lib/queue', ...ground, ...pure],
  },
  {
    name: 'lib/data',
    holds: /^lib\/data\//,
    calls: ['db', 'lib/auth', 'lib/export', 'lib/files', 'lib/mail', 'lib/queue', ...ground, ...pure],
  },
  { name: 'lib/auth', holds: /^lib\/auth\//, calls: ['db', 'lib/mail', 'lib/book', 'lib/balance', ...ground] },
  { name: 'lib/export', holds: /^lib\/export\//, calls: pure },
  // Its one table is the outbox that lib/auth and lib/data both fill: neither can hold it for the other.
  { name: 'lib/mail', holds: /^lib\/mail\//, calls: ['db', 'lib/queue', ...ground] },
  { name: 'lib/files', holds: /^lib\/files\//, calls: ground },
  { name: 'db', holds: /^db\//, calls: [...ground, 'lib/queue', 'lib/book', 'lib/balance'] },
  { name: 'lib/queue', holds: /^lib\/queue\//, calls: ground },
  { name: 'lib/sheet', holds: /^lib\/sheet\//, calls: ['lib/book', 'lib/balance', 'lib/errors'] },
  { name: 'lib/lab', holds: /^lib\/lab\//, calls: ['lib/book', 'lib/balance', 'lib/errors'] },
  { name: 'lib/book', holds: /^lib\/book\//, calls: ['lib/balance', 'lib/errors'] },
  { name: 'lib/balance', holds: /^lib\/balance\//, calls: [] },
  { name: 'lib/http', holds: /^lib\/http\//, calls: ['lib/env', 'lib/errors'] },
  { name: 'lib/env', holds: /^lib\/env\.ts$/, calls: [] },
  { name: 'lib/errors', holds: /^lib\/errors\.ts$/, calls: [] },
  { name: 'lib/local', holds: /^lib\/local\//, calls: [] },
  { name: 'settings', holds: /^[\w.-]+\.config\.(ts|mjs)$|^next-env\.d\.ts$/, calls: [] },
]

export function roomOf(file: string): Room | undefined {
  return rooms.find((room) => room.holds.test(file))
}

/** Rooms without a screen, a server or a clock: what they answer depends on what they are given alone. */
export const pureRooms = ['lib/balance', 'lib/book', 'lib/sheet', 'lib/lab']

/** Packages that only a server can run, or that draw: no business in a pure room. */
export const notPure =
  /^(node:|(react|react-dom|next|swr|pg|pino|drizzle-orm|better-auth|idb|sonner|radix-ui|lucide-react)(\/|$)|@tanstack\/)/

/** What may never reach a browser: the database, secrets, the machine. */
export const serverOnlyFile = /^(db\/.*\.ts$|lib\/(env\.ts|http\/|data\/.*\.ts$|files\/|jobs\/|mail\/|queue\/|local\/))/
export const serverOnlyPackage =
  /^(node:|server-only$|(pg|pino|drizzle-orm|next\/headers|next\/server|better-auth\/(api|adapters|plugins|node|next-js))(\/|$)|better-auth$)/
