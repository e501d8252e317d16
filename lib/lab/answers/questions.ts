import { headWords } from '../heads/roles'
import type { LabQuestion } from '../model'
import type { AnalyteFacts, Ledger } from '../table/ledger'

const MOISTURE =
  /^(?:(?:total |residual |free |surface |inherent |rest)?moisture(?: content)?|(?:rest|gesamt|grob)?feuchte?|feuchtigkeit|feuchtegehalt|wassergehalt|water content|loss on drying|trocknungsverlust)$/
/** Units of parts of a mass, where per wet and per dry mass differ; no unit can be one too. */
const OF_MASS =
  /^(?:|(?:wt|w|m|ma|gew|mass|masse|massen|weight)?[\s.-]*(?:%|‰)(?: ?\(?[wm]\/[wm]\)?)?|per ?cent|prozent|ppm ?\(?[wm]?\)?|ppb ?\(?[wm]?\)?|[mµμun]?g ?\/ ?(?:k|100 ?)?g|k?g ?\/ ?t)$/i
const NO_UNIT =
  /^(?:ph|ph value|ph wert|density|dichte|specific gravity|sg|relative density|colou?r|farbe|ratio|verhältnis|index|refractive index|brechungsindex|n20d|mol ratio|count|sio2 na2o)/

/** The questions of bases and units that one table leaves open. */
export function openQuestions(ledger: Ledger): LabQuestion[] {
  const measured = [...ledger.analytes].filter(([, facts]) => facts.measured)
  return [...basisQuestions(measured), ...unitQuestions(measured)]
}

function basisQuestions(measured: [string, AnalyteFacts][]): LabQuestion[] {
  const bases = new Set(measured.flatMap(([, facts]) => [...facts.bases]))
  const both = bases.has('as-received') && (bases.has('dry') || bases.has('dry-ash-free'))
  const where = measured
    .filter(([analyte, { units, bases: own }]) => {
      if (!own.has('')) return false
      if (MOISTURE.test(headWords(analyte)) && [...units].some((unit) => /^(?:%|per ?cent|prozent)$/i.test(unit)))
        return true
      return both && [...units].every((unit) => OF_MASS.test(unit)) && !NO_UNIT.test(headWords(analyte))
    })
    .map(([analyte]) => analyte)
  return where.length === 0 ? [] : [{ code: 'basis', where, options: ['as-received', 'dry'] }]
}

/** Two units for one column, or none where the others have one. */
function unitQuestions(measured: [string, AnalyteFacts][]): LabQuestion[] {
  const questions: LabQuestion[] = []
  for (const [analyte, { clashing }] of measured)
    if (clashing) questions.push({ code: 'unit', where: [analyte], options: clashing })
  const units = new Set(measured.flatMap(([, facts]) => [...facts.units]))
  units.delete('')
  const known = measured.filter(([, facts]) => !facts.units.has('')).length
  const where = measured
    .filter(([analyte, facts]) => facts.units.has('') && !facts.clashing && !NO_UNIT.test(headWords(analyte)))
    .map(([analyte]) => analyte)
  if (where.length > 0 && known > where.length) questions.push({ code: 'unit', where, options: [...units] })
  return questions
}
