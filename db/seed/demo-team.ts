import type { Role } from '@/lib/auth/permissions'
import type { StarterName } from '@/lib/book/starters'

/** The demo team: people, plants and numbers are invented. Its accounts stand in demo-accounts.json. */
export const demoTeam = { id: 'demo-kestrel', slug: 'kestrel', name: 'Kestrel Process Group' }

export const demoNames: Readonly<Record<Role, string>> = {
  owner: 'Ingrid Falkner',
  engineer: 'Tomás Okafor',
  analyst: 'Priya Lindqvist',
  checker: 'Henrik Adeyemi',
  reader: 'Mara Kowalczyk',
}

export type DemoProject = {
  id: string
  name: string
  starter: StarterName
  documentNumber: string
  /** Analysts and readers see only the projects they belong to. */
  members: readonly Role[]
}

export const demoProjects: readonly DemoProject[] = [
  {
    id: 'demo-kestrel-flats',
    name: 'Kestrel Flats Salt Works',
    starter: 'salt',
    documentNumber: 'KF-100-PR-HMB-0001',
    members: ['analyst', 'reader'],
  },
  {
    id: 'demo-marisol-bay',
    name: 'Marisol Bay Peel Products',
    starter: 'citrus',
    documentNumber: 'MB-200-PR-HMB-0001',
    members: [],
  },
  {
    id: 'demo-nordvik',
    name: 'Nordvik Battery Metals',
    starter: 'black-mass',
    documentNumber: 'NV-300-PR-HMB-0001',
    members: ['analyst'],
  },
  {
    id: 'demo-fennholt',
    name: 'Fennholt Green Gas',
    starter: 'biogas',
    documentNumber: 'AG-400-PR-HMB-0001',
    members: [],
  },
  {
    id: 'demo-lindale',
    name: 'Lindale Valley Dairy',
    starter: 'whey',
    documentNumber: 'LV-500-PR-HMB-0001',
    members: [],
  },
]
