import { AnalysisError } from '../analysis-error'
import { type Dimension } from './dimension'
import { formatNumber, formatWithUncertainty } from './format-number'
import { type Unit, unitFromAlias } from './unit-from-alias'

/** Units a quantity is printed in, each with the absolute SI value from which on it serves; the last one serves below all. */
const PRACTICAL: Readonly<Record<Dimension, readonly (readonly [from: number, alias: string])[]>> = {
  temperature: [[0, '°C']],
  'temperature-difference': [[0, 'K']],
  'temperature-rate': [[0, 'K/min']],
  pressure: [
    [10_000, 'bar'],
    [100, 'mbar'],
    [0, 'Pa'],
  ],
  mass: [
    [1, 'kg'],
    [1e-3, 'g'],
    [1e-6, 'mg'],
    [0, 'µg'],
  ],
  length: [
    [1, 'm'],
    [1e-3, 'mm'],
    [1e-6, 'µm'],
    [0, 'nm'],
  ],
  'volume-flow': [
    [1e-4, 'm3/h'],
    [1e-5, 'L/min'],
    [0, 'mL/min'],
  ],
  'molar-flow': [
    [1, 'mol/s'],
    [1e-3, 'mmol/s'],
    [0, 'µmol/s'],
  ],
  'mass-flow': [
    [1e-3, 'kg/h'],
    [0, 'g/h'],
  ],
  time: [
    [3_600, 'h'],
    [120, 'min'],
    [0, 's'],
  ],
  volume: [
    [1, 'm3'],
    [1e-3, 'L'],
    [1e-6, 'mL'],
    [0, 'µL'],
  ],
  fraction: [
    [1e-3, '%'],
    [0, 'ppm'],
  ],
  'amount-per-mass': [
    [1, 'mmol/g'],
    [0, 'µmol/g'],
  ],
  'energy-per-amount': [[0, 'kJ/mol']],
  'rate-per-mass': [
    [1, 'mmol g-1 s-1'],
    [1e-3, 'µmol g-1 s-1'],
    [0, 'nmol g-1 s-1'],
  ],
  frequency: [
    [1e-2, 's-1'],
    [0, 'h-1'],
  ],
  'area-per-mass': [[0, 'm2/g']],
  'volume-per-mass': [[0, 'cm3/g']],
  density: [[0, 'g/cm3']],
  'molar-mass': [[0, 'g/mol']],
  diffusivity: [
    [1e-6, 'cm2/s'],
    [0, 'm2/s'],
  ],
  viscosity: [[0, 'Pa s']],
  'thermal-conductivity': [[0, 'W m-1 K-1']],
}

/** How to print a quantity. */
export interface FormatOptions {
  /** alias of the unit to print in; a practical one by size without it */
  readonly unit?: string
  /** one standard uncertainty [SI unit of the dimension] */
  readonly standardUncertaintySi?: number | null
  /** digits without an uncertainty, 1 to 15 */
  readonly significantDigits?: number
}

/**
 * Unit that a quantity of this size is usually printed in.
 *
 * Source: common practice of the trade.
 *
 * @param valueSi - the value [SI unit of the dimension]
 * @param dimension - its kind [-]
 * @returns the unit [-]
 */
export function practicalUnit(valueSi: number, dimension: Dimension): Unit {
  const size = Math.abs(valueSi)
  const choices = PRACTICAL[dimension]
  const alias = (choices.find(([from]) => size >= from) ?? choices[choices.length - 1])?.[1] ?? ''
  return requireUnit(valueSi === 0 ? (choices[0]?.[1] ?? alias) : alias, dimension)
}

/**
 * A quantity in words and figures, in a practical unit or one of the reader's choice.
 *
 * With an uncertainty the value is rounded to its second digit; without, to four significant digits. Nothing but the text is rounded.
 * Source: JCGM 100:2008, clause 7.2.6.
 *
 * @param valueSi - the value [SI unit of the dimension]
 * @param dimension - its kind [-]
 * @param options - unit to print in, standard uncertainty, digits [-]
 * @returns text such as `80.00 ± 0.45 mg` [-]; a pressure unit says `gauge` or `absolute` where its alias does
 * @throws {AnalysisError} unknown-unit when the alias is not a unit of that kind
 * @example 518.15 K is `245.0 °C`
 */
export function formatQuantity(valueSi: number, dimension: Dimension, options: FormatOptions = {}): string {
  if (!Number.isFinite(valueSi)) return 'not known'
  const unit = options.unit === undefined ? practicalUnit(valueSi, dimension) : requireUnit(options.unit, dimension)
  const value = unit.fromSi(valueSi)
  const uncertainty = options.standardUncertaintySi ?? null
  const space = unit.label === '' ? '' : ' '
  if (uncertainty === null) return `${formatNumber(value, options.significantDigits ?? 4)}${space}${unit.label}`
  // a difference, so that the shift of a temperature scale drops out
  const spread = Math.abs(unit.fromSi(valueSi + uncertainty) - value)
  const text = formatWithUncertainty(value, spread)
  return `${text.includes('±') && !text.startsWith('(') && unit.label !== '' ? `(${text})` : text}${space}${unit.label}`
}

function requireUnit(alias: string, dimension: Dimension): Unit {
  const unit = unitFromAlias(alias, dimension)
  if (unit === null)
    throw new AnalysisError('unknown-unit', `“${alias}” is not a known unit of ${dimension.replaceAll('-', ' ')}.`, {
      alias,
      dimension,
    })
  return unit
}
