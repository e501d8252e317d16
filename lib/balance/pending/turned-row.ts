import type { LinearForm } from '../measure/measure'

/** A linear row that a rule has turned into, and the forms whose known values it rests on. */
export type TurnedRow = { form: LinearForm; restsOn: LinearForm[] }
