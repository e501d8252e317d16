import { remember } from '../cells/remember'
import { plainSpaces } from '../cells/spaces'

/** What a column (or, in a transposed table, a row) is for, where its head says so. */
export type Role =
  | 'id'
  | 'weakId'
  | 'stream'
  | 'point'
  | 'date'
  | 'time'
  | 'note'
  | 'method'
  | 'about'
  | 'analyte'
  | 'result'
  | 'qualifier'
  | 'unit'
  | 'basis'
  | 'uncertainty'
  | 'replicate'

/** Head words, English and German. The order within `id` is the order of preference. */
const words: Record<Role, string> = {
  id: 'sample id|sampleid|sample no|sample nr|sample number|sample code|sample ref|sample reference|sample|probe|proben id|probenid|proben nr|probennr|probe nr|probennummer|probenbezeichnung|probencode|probenname|probe id|sample name|sample identification|specimen|specimen id|muster|muster nr|lims id|lims no|lims nr|lab id|lab no|lab nr|lab number|lab ref|lab sample id|lab sample no|labor nr|labornr|labornummer|labor id|analysennummer|analysen nr|sample label|samples|proben|client sample id|customer sample id',
  weakId:
    'id|no|nr|number|nummer|lfd nr|ref|reference|name|batch|batch no|lot|lot no|charge|chargen nr|bottle|flasche|code|label|kennung|bezeichnung|item',
  stream:
    'stream|stream no|stream nr|stream number|stream id|stream tag|stream name|streams|strom|strom nr|stromnr|stromnummer|stoffstrom|strom id|stoffstrom nr|pfd stream|process stream',
  point:
    'sample point|sampling point|samplepoint|sample location|sampling location|location|probenahmestelle|probenahmeort|entnahmestelle|messstelle|probestelle|probenstelle|ort|station|tap|tag|position',
  date: 'date|datum|date time|datetime|date and time|sampled|sampled at|sampled on|sample date|sampledate|sampling date|sample time|sampling time|sample date time|sampling date time|taken|taken at|taken on|collected|collected at|collected on|collection date|collection time|date sampled|date taken|date collected|time sampled|timestamp|time stamp|zeitpunkt|probenahme|probenahmedatum|probenahmezeit|probenahmezeitpunkt|probenahme am|entnahme|entnahmedatum|entnahmezeit|entnommen|entnommen am|datum uhrzeit|datum zeit|datum und uhrzeit|probendatum|gezogen am|taken at utc|sampled datetime|collection date time',
  time: 'time|uhrzeit|zeit|hour|time of day',
  note: 'note|notes|remark|remarks|comment|comments|bemerkung|bemerkungen|anmerkung|anmerkungen|kommentar|kommentare|notiz|notizen|hinweis|hinweise|observation|observations',
  method:
    'method|methods|methode|methoden|verfahren|test method|analysis method|analytical method|analysenmethode|analysenverfahren|prüfverfahren|prüfmethode|technique|norm|method code',
  about:
    'description|beschreibung|sample description|sample type|probenart|type|art|matrix|medium|sampled by|sampler|probenehmer|operator|analyst|analysed by|analyzed by|bearbeiter|laborant|lab|laboratory|labor|client|customer|kunde|project|projekt|plant|anlage|unit operation|shift|schicht|status|report|report no|order|order no|auftrag|auftrag nr|auftragsnummer|received|received at|received on|date received|receipt date|eingang|eingangsdatum|eingang am|analysed|analyzed|analysed on|analyzed on|analysis date|analysed at|analyzed at|date analysed|date analyzed|analysendatum|tested|tested at|date tested|test date|reported|reported at|date reported|report date|issued|issued at|prüfdatum|berichtsdatum|area|bereich|group|gruppe|container|gebinde|day|tag der probenahme|campaign|run|versuch|cas|cas no|cas nr|cas number',
  analyte:
    'analyte|analytes|analyt|analyten|parameter|parameters|component|components|komponente|komponenten|compound|compounds|constituent|constituents|determinand|determination|species|element|elements|stoff|substanz|substance|messgröße|messgrösse|prüfgröße|kenngröße|bestandteil|bestandteile|inhaltsstoff|test|test name|assay|property|eigenschaft|analyte name|analysis|analyse|verbindung|chemical|merkmal',
  result:
    'result|results|value|values|ergebnis|ergebnisse|wert|werte|messwert|analysenwert|reading|concentration|conc|konzentration|konz|content|gehalt|befund|reported result|final result|result value|amount|numeric result|measured|gemessen|anteil',
  qualifier:
    'qualifier|qualifiers|qual|q|flag|flags|result qualifier|qualifier code|lab qualifier|data qualifier|prefix|sign|vorzeichen|kennzeichen|kennz|mark|comparator|result flag|symbol',
  unit: 'unit|units|einheit|einheiten|einh|uom|unit of measure|units of measure|dimension|result unit|maßeinheit',
  basis:
    'basis|bezug|bezugsbasis|reporting basis|report basis|wet dry|dry wet|bezugszustand|moisture basis|result basis|bezugsgröße',
  uncertainty:
    'uncertainty|unsicherheit|messunsicherheit|expanded uncertainty|standard uncertainty|error|fehler|±|+ −|unc|measurement uncertainty|plus minus',
  replicate: 'replicate|rep|replicate no|rep no|wiederholung|duplicate|parallelbestimmung|run no|aliquot',
}
const roles = new Map<string, Role>()
const ranks = new Map<string, number>()
for (const [role, spelled] of Object.entries(words) as [Role, string][])
  for (const [rank, word] of spelled.split('|').entries()) {
    roles.set(word, role)
    ranks.set(word, rank)
  }

/** A head as the words it is looked up by: no case, no punctuation between words. */
export function headWords(text: string): string {
  return plainSpaces(text.replace(/([a-zäöü])([A-ZÄÖÜ][a-zäöü])/g, '$1 $2'))
    .toLowerCase()
    .replace(/\+ ?\/ ?[-−–]|\+-/g, '±')
    .replace(/[-_./#:;,°*()[\]]+/g, ' ')
    .replace(/ {2,}/g, ' ')
    .trim()
}

/** The role a head names, or undefined where it is an analyte's name or unknown. */
export const roleOf: (text: string) => Role | undefined = remember(roleAfresh)

function roleAfresh(text: string): Role | undefined {
  // NO is nitrogen monoxide, No. a number.
  if (plainSpaces(text) === 'NO') return undefined
  const spelled = headWords(text)
  return (
    roles.get(spelled) ??
    roles.get(spelled.replace(/ /g, '')) ??
    roles.get(spelled.replace(/ (?:no|nr|utc|local)$/, ''))
  )
}

/** How good a name is as a sample's id; less is better. */
export function idRank(text: string): number {
  return ranks.get(headWords(text)) ?? 1000
}
