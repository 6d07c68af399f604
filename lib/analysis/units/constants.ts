/** A number that nature or a definition fixes. */
export interface Constant {
  readonly value: number
  readonly unit: string
  readonly symbol: string
  readonly source: string
  /** year of the definition or adjustment the value is taken from */
  readonly year: number
}

/** Molar gas constant, N_A k_B, exact since 2019 [J mol-1 K-1]. Source: BIPM, The International System of Units, 9th edition, 2019. */
export const GAS_CONSTANT_J_PER_MOL_K = 8.31446261815324
/** Boltzmann constant, exact [J K-1]. Source: BIPM, The International System of Units, 9th edition, 2019. */
export const BOLTZMANN_CONSTANT_J_PER_K = 1.380649e-23
/** Planck constant, exact [J s]. Source: BIPM, The International System of Units, 9th edition, 2019. */
export const PLANCK_CONSTANT_J_S = 6.62607015e-34
/** Avogadro constant, exact [mol-1]. Source: BIPM, The International System of Units, 9th edition, 2019. */
export const AVOGADRO_CONSTANT_PER_MOL = 6.02214076e23
/** Elementary charge, exact [C]. Source: BIPM, The International System of Units, 9th edition, 2019. */
export const ELEMENTARY_CHARGE_C = 1.602176634e-19
/** Ice point on the Celsius scale, exact by definition [K]. Source: BIPM, The International System of Units, 9th edition, 2019. */
export const ZERO_CELSIUS_K = 273.15
/** Standard atmosphere, exact by definition [Pa]. Source: 10th General Conference on Weights and Measures, resolution 4, 1954. */
export const STANDARD_ATMOSPHERE_PA = 101_325
/** Standard acceleration of free fall, exact by definition [m s-2]. Source: 3rd General Conference on Weights and Measures, 1901. */
export const STANDARD_GRAVITY_M_PER_S2 = 9.80665
/** Avoirdupois pound, exact by definition [kg]. Source: International yard and pound agreement, 1959. */
export const POUND_KG = 0.45359237
/** Inch, exact by definition [m]. Source: International yard and pound agreement, 1959. */
export const INCH_M = 0.0254
/** Thermochemical calorie, exact by definition [J]. Source: ISO 80000-5:2019, annex. */
export const THERMOCHEMICAL_CALORIE_J = 4.184

const SI_2019 = 'BIPM, The International System of Units, 9th edition'

/** The same constants with symbol, unit, source and year, for a page or a working that shows where a number comes from. */
export const CONSTANTS = {
  gas: { symbol: 'R', value: GAS_CONSTANT_J_PER_MOL_K, unit: 'J mol-1 K-1', source: SI_2019, year: 2019 },
  boltzmann: { symbol: 'k_B', value: BOLTZMANN_CONSTANT_J_PER_K, unit: 'J K-1', source: SI_2019, year: 2019 },
  planck: { symbol: 'h', value: PLANCK_CONSTANT_J_S, unit: 'J s', source: SI_2019, year: 2019 },
  avogadro: { symbol: 'N_A', value: AVOGADRO_CONSTANT_PER_MOL, unit: 'mol-1', source: SI_2019, year: 2019 },
  elementaryCharge: { symbol: 'e', value: ELEMENTARY_CHARGE_C, unit: 'C', source: SI_2019, year: 2019 },
  zeroCelsius: { symbol: 'T_0', value: ZERO_CELSIUS_K, unit: 'K', source: SI_2019, year: 2019 },
  standardAtmosphere: {
    symbol: 'atm',
    value: STANDARD_ATMOSPHERE_PA,
    unit: 'Pa',
    source: '10th General Conference on Weights and Measures, resolution 4',
    year: 1954,
  },
  standardGravity: {
    symbol: 'g_n',
    value: STANDARD_GRAVITY_M_PER_S2,
    unit: 'm s-2',
    source: '3rd General Conference on Weights and Measures',
    year: 1901,
  },
  pound: { symbol: 'lb', value: POUND_KG, unit: 'kg', source: 'International yard and pound agreement', year: 1959 },
  inch: { symbol: 'in', value: INCH_M, unit: 'm', source: 'International yard and pound agreement', year: 1959 },
  thermochemicalCalorie: {
    symbol: 'cal_th',
    value: THERMOCHEMICAL_CALORIE_J,
    unit: 'J',
    source: 'ISO 80000-5, annex',
    year: 2019,
  },
} as const satisfies Readonly<Record<string, Constant>>
