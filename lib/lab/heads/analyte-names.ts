import { parseFormula } from '@/lib/balance'
import { plainDigits, plainSpaces } from '../cells/spaces'
import { headWords } from './roles'

/** Names that analyses go by, English and German; only used to tell a head of analytes from a head of samples. */
const names = new Set(
  [
    'moisture|moisture content|water|water content|wasser|wassergehalt|feuchte|feuchtigkeit|restfeuchte|loss on drying|trocknungsverlust',
    'ash|asche|aschegehalt|solids|total solids|dissolved solids|suspended solids|tds|tss|tvs|vs|ts|ots|dry matter|dry solids|dry residue',
    'trockenmasse|trockensubstanz|lösl trockenmasse|feststoff|feststoffe|glühverlust|glührückstand|loi|loss on ignition|volatile matter',
    'fibre|fiber|faser|fat|fett|protein|eiweiß|lactose|laktose|sugar|zucker|starch|stärke|cellulose|hemicellulose|lignin|oil|öl|brix|ph',
    'ph value|ph wert|density|dichte|conductivity|leitfähigkeit|viscosity|viskosität|turbidity|trübung|temperature|temperatur|temp|hardness',
    'härte|alkalinity|alkalität|acidity|säure|cod|csb|bod|bod5|bsb5|toc|doc|tn|tkn|tp|tic|ammonia|ammonium|ammoniak|nitrate|nitrat|nitrite',
    'nitrit|phosphate|phosphat|sulphate|sulfate|sulfat|chloride|chlorid|fluoride|fluorid|carbonate|karbonat|bicarbonate|silica|kieselsäure',
    'methane|methan|ethane|propane|butane|hydrogen|wasserstoff|oxygen|sauerstoff|nitrogen|stickstoff|carbon dioxide|carbon monoxide',
    'kohlendioxid|hydrogen sulphide|hydrogen sulfide|schwefelwasserstoff|ethanol|methanol|acetic acid|essigsäure|glucose|fructose|sucrose',
    'saccharose|glycerol|glycerin|iron|eisen|copper|kupfer|zinc|zink|lead|blei|nickel|cobalt|kobalt|lithium|sodium|natrium|potassium|kalium',
    'calcium|kalzium|magnesium|manganese|mangan|aluminium|aluminum|silicon|silizium|sulphur|sulfur|schwefel|phosphorus|phosphor|gold|silver',
    'silber|chromium|chrom|cadmium|arsenic|arsen|mercury|quecksilber|titanium|titan|insolubles|unlösliches|limonene|limonen|d limonen|salt|salz',
    'total p|total n|total s|total c|total carbon|total nitrogen|total phosphorus|gesamtstickstoff|gesamtphosphor|total iron|purity|reinheit|yield',
  ].flatMap((line) => line.split('|')),
)

/** 2: known by name or clearly a formula; 1: could be a formula and could be a sample ("S2"); 0: nothing known. */
export function analyteScore(name: string): 0 | 1 | 2 {
  const spelled = plainDigits(plainSpaces(name))
  if (spelled === '' || spelled.length > 40) return 0
  if (names.has(headWords(spelled))) return 2
  const bare = spelled
    .replace(/ ?\(.*\)$/, '')
    .replace(/(?:[ -](?:N|P|S|C))$/, '')
    .replace(/[⁺⁻²³]+$|\d?[+-]$/, '')
  if (!/^[A-Z][A-Za-z0-9()·.]*$/.test(bare)) return 0
  const atoms = parseFormula(bare)
  if (!atoms) return 0
  if (/^(?:[A-Z]\d?|[A-Z]\d\d)$/.test(bare)) return /^(?:H2|N2|O2|Cl2|[A-Z])$/.test(bare) ? 2 : 1
  return /^[A-Z][a-z]\d+$/.test(bare) ? 1 : 2
}
