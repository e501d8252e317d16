import { combine, constantForm, type LinearForm, part, total } from '../measure/measure'
import type { Model } from '../model'

/** Flow of one component in several streams together. */
export const poolPart = (model: Model, pool: number[], component: number): LinearForm =>
  pool.reduce((form, s) => combine(1, form, 1, part(model, s, component)), constantForm(0))

/** Total flow of several streams together. */
export const poolTotal = (model: Model, pool: number[]): LinearForm =>
  pool.reduce((form, s) => combine(1, form, 1, total(model, s)), constantForm(0))
