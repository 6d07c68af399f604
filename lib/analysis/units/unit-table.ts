import {
  AVOGADRO_CONSTANT_PER_MOL,
  ELEMENTARY_CHARGE_C,
  GAS_CONSTANT_J_PER_MOL_K,
  INCH_M,
  POUND_KG,
  STANDARD_ATMOSPHERE_PA,
  STANDARD_GRAVITY_M_PER_S2,
  THERMOCHEMICAL_CALORIE_J,
} from './constants'
import { type FlowReference, NORMAL_REFERENCE } from './flow-reference'

/*
 * Why an own table and not a unit library: the words on rigs and analysers are trade words (sccm, barg, mln, mol gmetal-1) whose meaning
 * hangs on a state or a basis that general libraries do not carry, and general libraries accept prefixes and case variants that would read
 * "m" as minutes or "M" as mega without asking. Every factor here is a ratio of two numbers that are exact as doubles or defined by
 * convention, so a conversion rounds once.
 */

/** Exponents of kilogram, metre, second, mole, kelvin. */
export type Exponents = readonly [number, number, number, number, number]

/** One word that a unit expression can be built from. The value in SI is number × numerator / denominator. */
export interface UnitWord {
  readonly label: string
  /** exact spellings, case included */
  readonly aliases: readonly string[]
  readonly numerator: number
  readonly denominator: number
  readonly exponents: Exponents
  /** for a volume counted at a reference state: the state, or null when the word does not say which one */
  readonly standardVolume?: FlowReference | null
  /** for a mass that is not the mass of the catalyst as loaded */
  readonly massOf?: 'metal'
  /** fractions only: by amount, or by mass */
  readonly fractionOf?: 'amount' | 'mass'
}

const word = (
  label: string,
  aliases: string,
  numerator: number,
  denominator: number,
  exponents: Exponents,
  more: Pick<UnitWord, 'standardVolume' | 'massOf' | 'fractionOf'> = {},
): UnitWord => ({ label, aliases: aliases.split(' '), numerator, denominator, exponents, ...more })

const MASS: Exponents = [1, 0, 0, 0, 0]
const LENGTH: Exponents = [0, 1, 0, 0, 0]
const VOLUME: Exponents = [0, 3, 0, 0, 0]
const TIME: Exponents = [0, 0, 1, 0, 0]
const AMOUNT: Exponents = [0, 0, 0, 1, 0]
const TEMPERATURE: Exponents = [0, 0, 0, 0, 1]
const PRESSURE: Exponents = [1, -1, -2, 0, 0]
const ENERGY: Exponents = [1, 2, -2, 0, 0]
const POWER: Exponents = [1, 2, -3, 0, 0]
const FORCE: Exponents = [1, 1, -2, 0, 0]
const VISCOSITY: Exponents = [1, -1, -1, 0, 0]
const CONCENTRATION: Exponents = [0, -3, 0, 1, 0]
const PER_TIME: Exponents = [0, 0, -1, 0, 0]
const NONE: Exponents = [0, 0, 0, 0, 0]

const CUBIC_FOOT_M3 = 12 * INCH_M * (12 * INCH_M) * (12 * INCH_M)
/** Conventional density of mercury [kg m-3]: 1 mmHg = 133.322387415 Pa. Source: ISO 80000-4:2019. */
const MILLIMETRE_OF_MERCURY_PA = 133.322387415
const MILLIMETRE_OF_WATER_PA = STANDARD_GRAVITY_M_PER_S2
/** 6894.757293168 Pa, from the definitions of pound, inch and standard gravity. */
const PSI_PA = (POUND_KG * STANDARD_GRAVITY_M_PER_S2) / (INCH_M * INCH_M)

/** Words of unit expressions. Spellings are exact: `m` is a metre and never a minute, `M` is a mole per litre and never a million. */
export const UNIT_WORDS: readonly UnitWord[] = [
  word('t', 't tonne tonnes', 1_000, 1, MASS),
  word('kg', 'kg KG kgcat', 1, 1, MASS),
  word('g', 'g gcat gram grams gramme grammes', 1, 1_000, MASS),
  word('mg', 'mg mgcat', 1, 1_000_000, MASS),
  word('µg', 'µg ug', 1, 1_000_000_000, MASS),
  word('lb', 'lb lbs', POUND_KG, 1, MASS),
  word('kg metal', 'kgmetal kgMe', 1, 1, MASS, { massOf: 'metal' }),
  word('g metal', 'gmetal gMe', 1, 1_000, MASS, { massOf: 'metal' }),
  word('mg metal', 'mgmetal mgMe', 1, 1_000_000, MASS, { massOf: 'metal' }),

  word('m', 'm metre metres meter meters', 1, 1, LENGTH),
  word('dm', 'dm', 1, 10, LENGTH),
  word('cm', 'cm', 1, 100, LENGTH),
  word('mm', 'mm', 1, 1_000, LENGTH),
  word('µm', 'µm um micron microns', 1, 1_000_000, LENGTH),
  word('nm', 'nm', 1, 1_000_000_000, LENGTH),
  word('Å', 'Å angstrom Angstrom', 1, 10_000_000_000, LENGTH),
  word('in', 'in inch inches', INCH_M, 1, LENGTH),
  word('ft', 'ft foot feet', 12 * INCH_M, 1, LENGTH),

  word('m³', 'm3', 1, 1, VOLUME),
  word('L', 'L l litre litres liter liters', 1, 1_000, VOLUME),
  word('mL', 'mL ml', 1, 1_000_000, VOLUME),
  word('cm³', 'cm3 cc', 1, 1_000_000, VOLUME),
  word('µL', 'µL µl uL ul', 1, 1_000_000_000, VOLUME),
  word('ft³', 'cf ft3', CUBIC_FOOT_M3, 1, VOLUME),
  // n, N: counted at 0 °C and 101.325 kPa (DIN 1343)
  word('mLₙ', 'mln mLn Nml NmL mlN mLN', 1, 1_000_000, VOLUME, { standardVolume: NORMAL_REFERENCE }),
  word('cm³ₙ', 'Ncm3 Ncc cm3n', 1, 1_000_000, VOLUME, { standardVolume: NORMAL_REFERENCE }),
  word('Lₙ', 'ln Ln Nl NL lN LN', 1, 1_000, VOLUME, { standardVolume: NORMAL_REFERENCE }),
  word('m³ₙ', 'Nm3 m3n', 1, 1, VOLUME, { standardVolume: NORMAL_REFERENCE }),
  // s: a standard state, but the trades differ in which one (0, 15, 20, 21.1 or 25 °C)
  word('std mL', 'sml smL mls mLs stdmL stdml', 1, 1_000_000, VOLUME, { standardVolume: null }),
  word('std cm³', 'scc stdcm3 stdcc scm3', 1, 1_000_000, VOLUME, { standardVolume: null }),
  word('std L', 'sl sL ls Ls stdL stdl', 1, 1_000, VOLUME, { standardVolume: null }),
  word('std m³', 'Sm3 sm3 stdm3', 1, 1, VOLUME, { standardVolume: null }),
  word('std ft³', 'scf SCF stdft3', CUBIC_FOOT_M3, 1, VOLUME, { standardVolume: null }),

  word('s', 's sec secs second seconds', 1, 1, TIME),
  word('ms', 'ms', 1, 1_000, TIME),
  word('min', 'min mins minute minutes Min', 60, 1, TIME),
  word('h', 'h hr hrs hour hours', 3_600, 1, TIME),
  word('d', 'd day days', 86_400, 1, TIME),
  word('Hz', 'Hz', 1, 1, PER_TIME),

  word('mol', 'mol mole moles', 1, 1, AMOUNT),
  word('kmol', 'kmol', 1_000, 1, AMOUNT),
  word('mmol', 'mmol', 1, 1_000, AMOUNT),
  word('µmol', 'µmol umol', 1, 1_000_000, AMOUNT),
  word('nmol', 'nmol', 1, 1_000_000_000, AMOUNT),
  word('M', 'M', 1_000, 1, CONCENTRATION),

  word('K', 'K kelvin Kelvin', 1, 1, TEMPERATURE),

  word('Pa', 'Pa', 1, 1, PRESSURE),
  word('hPa', 'hPa', 100, 1, PRESSURE),
  word('kPa', 'kPa KPA', 1_000, 1, PRESSURE),
  word('MPa', 'MPa', 1_000_000, 1, PRESSURE),
  word('bar', 'bar Bar BAR', 100_000, 1, PRESSURE),
  word('mbar', 'mbar MBAR', 100, 1, PRESSURE),
  word('atm', 'atm ATM', STANDARD_ATMOSPHERE_PA, 1, PRESSURE),
  word('Torr', 'Torr torr TORR', STANDARD_ATMOSPHERE_PA, 760, PRESSURE),
  word('mTorr', 'mTorr mtorr', STANDARD_ATMOSPHERE_PA, 760_000, PRESSURE),
  word('mmHg', 'mmHg mmhg MMHG', MILLIMETRE_OF_MERCURY_PA, 1, PRESSURE),
  word('inHg', 'inHg', MILLIMETRE_OF_MERCURY_PA * 25.4, 1, PRESSURE),
  word('mmH₂O', 'mmH2O', MILLIMETRE_OF_WATER_PA, 1, PRESSURE),
  word('psi', 'psi PSI', PSI_PA, 1, PRESSURE),
  word('at', 'at', STANDARD_GRAVITY_M_PER_S2 * 10_000, 1, PRESSURE),
  word('kgf', 'kgf kp', STANDARD_GRAVITY_M_PER_S2, 1, FORCE),
  word('N', 'N', 1, 1, FORCE),

  word('J', 'J', 1, 1, ENERGY),
  word('kJ', 'kJ KJ', 1_000, 1, ENERGY),
  word('MJ', 'MJ', 1_000_000, 1, ENERGY),
  word('cal', 'cal', THERMOCHEMICAL_CALORIE_J, 1, ENERGY),
  word('kcal', 'kcal', THERMOCHEMICAL_CALORIE_J * 1_000, 1, ENERGY),
  word('W', 'W', 1, 1, POWER),
  word('mW', 'mW', 1, 1_000, POWER),
  word('cP', 'cP mPas', 1, 1_000, VISCOSITY),
  word('P', 'P poise', 1, 10, VISCOSITY),

  word('', '1 fraction molefraction frac', 1, 1, NONE),
  word('%', '% percent pct', 1, 100, NONE),
  word('mol%', 'mol% mol.% mol-% mole% molpct', 1, 100, NONE, { fractionOf: 'amount' }),
  word('vol%', 'vol% vol.% vol-% Vol% Vol.-% Vol-% vol.-% %v/v %vol volpct', 1, 100, NONE, { fractionOf: 'amount' }),
  word('ppm', 'ppm', 1, 1_000_000, NONE),
  word('ppmv', 'ppmv ppm(v) vppm ppmvol', 1, 1_000_000, NONE, { fractionOf: 'amount' }),
  word('ppb', 'ppb', 1, 1_000_000_000, NONE),
  word('ppbv', 'ppbv ppb(v)', 1, 1_000_000_000, NONE, { fractionOf: 'amount' }),
  word('wt%', 'wt% wt.% wt-% mass% Gew.-% Gew.% %w/w wtpct', 1, 100, NONE, { fractionOf: 'mass' }),
  word('ppmw', 'ppmw ppm(w) wppm', 1, 1_000_000, NONE, { fractionOf: 'mass' }),
]

/** Whole expressions that are one word, and what they stand for in words of the table. */
export const EXPRESSION_ALIASES: Readonly<Record<string, string>> = {
  sccm: 'scc/min',
  SCCM: 'scc/min',
  smlm: 'sml/min',
  SMLM: 'sml/min',
  slm: 'sl/min',
  slpm: 'sl/min',
  SLM: 'sl/min',
  SLPM: 'sl/min',
  slph: 'sl/h',
  nlpm: 'Nl/min',
  NLPM: 'Nl/min',
  'kg/cm2': 'kgf/cm2',
  lpm: 'L/min',
  LPM: 'L/min',
  scfh: 'scf/h',
  SCFH: 'scf/h',
  scfm: 'scf/min',
  SCFM: 'scf/min',
}

/** Temperature scales; the value in kelvin is (number + shift) × numerator / denominator. */
export interface TemperatureScale {
  readonly label: string
  readonly aliases: readonly string[]
  readonly shift: number
  readonly numerator: number
  readonly denominator: number
}

/** Temperature scales. A bare `C` or `deg` in a temperature means a degree Celsius, and the reading says so. */
export const TEMPERATURE_SCALES: readonly TemperatureScale[] = [
  {
    label: 'K',
    aliases: ['K', 'kelvin', 'Kelvin', '°K', 'KELVIN', 'degK', 'deg K'],
    shift: 0,
    numerator: 1,
    denominator: 1,
  },
  {
    label: '°C',
    aliases: [
      '°C',
      '° C',
      'degC',
      'deg C',
      'deg.C',
      'deg. C',
      'DEGC',
      'deg',
      '°',
      'C',
      'Celsius',
      'celsius',
      'oC',
      'Grad C',
      'degrees C',
      'degree C',
      'degrees Celsius',
      'degree Celsius',
      'Deg C',
      'DegC',
      'deg_C',
      '(C)',
    ],
    shift: 273.15,
    numerator: 1,
    denominator: 1,
  },
  {
    label: '°F',
    aliases: [
      '°F',
      '° F',
      'degF',
      'deg F',
      'deg. F',
      'DEGF',
      'F',
      'Fahrenheit',
      'fahrenheit',
      'degrees F',
      'Deg F',
      'DegF',
    ],
    shift: 459.67,
    numerator: 5,
    denominator: 9,
  },
]

/** Energies per amount that are written without "per mole". */
export const ENERGY_PER_AMOUNT_WORDS: Readonly<Record<string, { readonly label: string; readonly factor: number }>> = {
  eV: { label: 'eV', factor: ELEMENTARY_CHARGE_C * AVOGADRO_CONSTANT_PER_MOL },
  meV: { label: 'meV', factor: (ELEMENTARY_CHARGE_C * AVOGADRO_CONSTANT_PER_MOL) / 1_000 },
  K: { label: 'K (Ea/R)', factor: GAS_CONSTANT_J_PER_MOL_K },
}
