const FORMULAS: Readonly<Record<string, string>> = {
  hydrogen: 'H2',
  nitrogen: 'N2',
  oxygen: 'O2',
  argon: 'Ar',
  helium: 'He',
  neon: 'Ne',
  water: 'H2O',
  steam: 'H2O',
  'carbon dioxide': 'CO2',
  'carbon monoxide': 'CO',
  methane: 'CH4',
  ethane: 'C2H6',
  ethene: 'C2H4',
  ethylene: 'C2H4',
  ethyne: 'C2H2',
  acetylene: 'C2H2',
  propane: 'C3H8',
  propene: 'C3H6',
  propylene: 'C3H6',
  butane: 'C4H10',
  methanol: 'CH3OH',
  ethanol: 'C2H5OH',
  ammonia: 'NH3',
  'nitric oxide': 'NO',
  'nitrogen dioxide': 'NO2',
  'nitrous oxide': 'N2O',
  'hydrogen sulfide': 'H2S',
  'hydrogen sulphide': 'H2S',
  'sulfur dioxide': 'SO2',
  'sulphur dioxide': 'SO2',
}

/** Formula of a gas written by its English name, in any case; null where it is not such a name. */
export function formulaOfName(name: string): string | null {
  const key = name.trim().toLowerCase().replace(/\s+/g, ' ')
  return Object.hasOwn(FORMULAS, key) ? (FORMULAS[key] ?? null) : null
}
