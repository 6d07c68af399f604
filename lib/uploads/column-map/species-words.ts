const NAMES: Readonly<Record<string, string>> = {
  hydrogen: 'H2',
  wasserstoff: 'H2',
  hydrogene: 'H2',
  hidrogeno: 'H2',
  idrogeno: 'H2',
  waterstof: 'H2',
  nitrogen: 'N2',
  stickstoff: 'N2',
  azote: 'N2',
  nitrogeno: 'N2',
  azoto: 'N2',
  stikstof: 'N2',
  argon: 'Ar',
  helium: 'He',
  neon: 'Ne',
  oxygen: 'O2',
  sauerstoff: 'O2',
  oxygene: 'O2',
  oxigeno: 'O2',
  ossigeno: 'O2',
  water: 'H2O',
  wasser: 'H2O',
  eau: 'H2O',
  agua: 'H2O',
  steam: 'H2O',
  dampf: 'H2O',
  methane: 'CH4',
  methan: 'CH4',
  metano: 'CH4',
  methaan: 'CH4',
  ethane: 'C2H6',
  ethan: 'C2H6',
  ethene: 'C2H4',
  ethylene: 'C2H4',
  ethen: 'C2H4',
  ethin: 'C2H2',
  acetylene: 'C2H2',
  acetylen: 'C2H2',
  propane: 'C3H8',
  propan: 'C3H8',
  propene: 'C3H6',
  propylene: 'C3H6',
  propen: 'C3H6',
  methanol: 'CH3OH',
  ethanol: 'C2H5OH',
  ammonia: 'NH3',
  ammoniak: 'NH3',
  ammoniac: 'NH3',
  'carbon dioxide': 'CO2',
  kohlendioxid: 'CO2',
  kohlenstoffdioxid: 'CO2',
  'dioxyde de carbone': 'CO2',
  'dioxido de carbono': 'CO2',
  'carbon monoxide': 'CO',
  kohlenmonoxid: 'CO',
  kohlenstoffmonoxid: 'CO',
  'monoxyde de carbone': 'CO',
  'monoxido de carbono': 'CO',
  'nitric oxide': 'NO',
  'nitrogen dioxide': 'NO2',
  'nitrous oxide': 'N2O',
}

const FORMULAS = [
  'H2',
  'N2',
  'Ar',
  'He',
  'Ne',
  'O2',
  'CO',
  'CO2',
  'H2O',
  'CH4',
  'C2H2',
  'C2H4',
  'C2H6',
  'C3H6',
  'C3H8',
  'C4H10',
  'CH3OH',
  'C2H5OH',
  'CH3OCH3',
  'HCHO',
  'HCOOH',
  'NH3',
  'NO',
  'NO2',
  'N2O',
  'SO2',
  'H2S',
  'C6H6',
]

/** Species by formula or name, in the campaign's own spelling first. */
export class SpeciesWords {
  readonly #exact = new Map<string, string>()
  readonly #folded = new Map<string, string>()

  constructor(species: readonly string[]) {
    for (const formula of [...species, ...FORMULAS]) {
      if (!this.#exact.has(formula)) this.#exact.set(formula, formula)
      const folded = formula.toLowerCase()
      if (!this.#folded.has(folded)) this.#folded.set(folded, formula)
    }
    for (const [name, formula] of Object.entries(NAMES)) if (!this.#folded.has(name)) this.#folded.set(name, formula)
  }

  /** a cell that is nothing but a species; null otherwise */
  named(text: string): string | null {
    const plain = plainDigits(text.trim())
    const folded = plain
      .normalize('NFD')
      .replace(/[\u0300-\u036f]/g, '')
      .toLowerCase()
    return this.#exact.get(plain) ?? this.#folded.get(folded) ?? null
  }

  /** the species a header speaks of, with the words left when it is taken out; null where there is none or more than one */
  within(label: string): { readonly species: string; readonly rest: string } | null {
    const plain = plainDigits(label)
    const whole = this.named(plain)
    if (whole !== null) return { species: whole, rest: '' }
    const words = plain.split(/[^\p{L}\p{N}]+/u).filter((word) => word !== '')
    for (let count = Math.min(3, words.length); count >= 1; count--)
      for (let i = 0; i + count <= words.length; i++) {
        const species = this.named(words.slice(i, i + count).join(' '))
        // `no` is a number column far more often than nitric oxide, `he` may be a word: two letters must be written as the formula is
        if (species === null || (count === 1 && (words[i]?.length ?? 0) <= 2 && !this.#exact.has(words[i] ?? '')))
          continue
        return { species, rest: [...words.slice(0, i), ...words.slice(i + count)].join(' ') }
      }
    return null
  }
}

function plainDigits(text: string): string {
  return text.replace(/[₀-₉]/g, (digit) => String(digit.charCodeAt(0) - 0x2080))
}
