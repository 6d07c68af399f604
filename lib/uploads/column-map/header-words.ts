const words = (text: string): ReadonlySet<string> => new Set(text.split(' '))

/** Words of headers by what they speak of, in the languages that rigs are set up in; accents are left out, as the labels' are. */
export const HEADER_WORDS = {
  set: words('set sp setpoint setp tset soll sollwert sw vorgabe consigne target programmed demand setpunt ziel'),
  bed: words(
    'bed bett cat catalyst kat katalysator reactor reaktor ist istwert pv actual inner lit lecho bedtc tbed sample probe',
  ),
  wall: words('wall wand furnace ofen oven four heater heizung mantel jacket shell outer paroi horno twall heizer'),
  temperature: words('t temp temperature temperatur temperatura tc thermocouple thermoelement tic ti'),
  pressure: words('p press pressure druck pression presion pressione pi pic pt drucke'),
  inlet: words('in inlet ein eingang eintritt vor upstream feed entree entrada before pre zulauf'),
  outlet: words('out outlet aus ausgang austritt nach downstream effluent sortie salida after post ablauf'),
  flow: words('flow q mfc fluss durchfluss volumenstrom debit caudal f fic fi mfm gasfluss strom stroom portata'),
  valve: words('valve ventil position stream vanne valvula path gasweg mode hahn weg schaltung bypass route'),
  time: words(
    'time timestamp zeit zeitpunkt uhrzeit datetime date datum clock heure hora fecha zeitstempel acquired injected sampled tijd temps tiempo',
  ),
  elapsed: words(
    'elapsed laufzeit runtime duration dauer verstrichen ecoule transcurrido since tos time zeit t temps tiempo seit',
  ),
  number: words(
    'no nr number nummer num injection inj lauf run index id # einspritzung messung analysis analyse injektion sequence line zeile',
  ),
  component: words(
    'component komponente compound species name peak stoff gas analyte substance verbindung composant componente bestandteil spezies molecule',
  ),
  area: words('area flaeche flache peakarea peakflache peakflaeche aire superficie counts areas'),
  height: words('height hohe hoehe hauteur altura'),
  retention: words('ret retention rt retentionszeit retzeit rettime retentionstime tr'),
  composition: words(
    'conc concentration konzentration konz anteil fraction mol molfraction gehalt teneur composition mole vol stoffmenge x y amount molenbruch stoffmengenanteil',
  ),
  start: words('start started begin beginn begonnen gestartet debut inicio begun acquired startzeit starttime'),
  date: words('date datum fecha data tag jour'),
  clockTime: words('time zeit uhrzeit heure hora'),
} as const

/** Words in a valve column that mean the gas goes round the reactor. */
export const BYPASS_WORDS = words(
  'bypass by-pass byp bypassed umgehung kurzschluss derivation contournement derivacion bp',
)

export function speaksOf(labelWords: readonly string[], subject: keyof typeof HEADER_WORDS): boolean {
  return labelWords.some((word) => HEADER_WORDS[subject].has(word))
}
