import { STANDARD_ATMOSPHERE_PA } from './constants'
import { type Dimension } from './dimension'
import { type FlowReference } from './flow-reference'
import { formatNumber } from './format-number'
import { molarFlowFromVolumeFlow } from './molar-flow-from-volume-flow'
import { type DecimalMark, parseNumber } from './parse-number'
import { meshOpeningM } from './sieve-series'
import { type PressureKind, type Unit, unitFromAlias } from './unit-from-alias'

/** What the caller knows about how the quantity is written. */
export interface QuantityOptions {
  readonly decimalMark?: DecimalMark
  /** alias of the unit a bare number is in; without it a bare number is refused */
  readonly defaultUnit?: string
  /** reference state of a volume flow that does not state its own, as answered by a person or stored with the rig */
  readonly flowReference?: FlowReference | null
  /** fractions: what the caller needs; a fraction that says it is by the other is refused */
  readonly fractionOf?: 'amount' | 'mass'
  /** per-mass quantities: what the caller needs; catalyst unless it says metal */
  readonly massOf?: 'catalyst' | 'metal'
}

/** A quantity as read, or a sentence that says what is wrong and what to write. */
export type QuantityReading =
  | {
      readonly ok: true
      /** in the SI unit of the dimension; a gauge pressure is still a gauge pressure */
      readonly valueSi: number
      readonly unitLabel: string
      /** what was understood, in words, to show beside the field */
      readonly said: string
      readonly pressureKind?: PressureKind
      /** volume flows: the state the volume is counted at; null means the caller must ask */
      readonly flowReference?: FlowReference | null
      readonly fractionOf?: 'amount' | 'mass' | 'unstated'
    }
  | { readonly ok: false; readonly sentence: string }

/** A unit that a person can copy, for the sentence that asks for one. */
const EXAMPLES: Readonly<Record<Dimension, string>> = {
  temperature: '245 °C',
  'temperature-difference': '2 K',
  'temperature-rate': '5 K/min',
  pressure: '1.3 bar absolute',
  mass: '80 mg',
  length: '4 mm',
  'volume-flow': '60 mL/min (0 °C, 1013 mbar)',
  'molar-flow': '2.5 mmol/min',
  'mass-flow': '1.2 g/h',
  time: '2 h',
  volume: '0.5 mL',
  fraction: '5 %',
  'amount-per-mass': '50 µmol/g',
  'energy-per-amount': '80 kJ/mol',
  'rate-per-mass': '1.4 µmol g-1 s-1',
  frequency: '0.02 s-1',
  'area-per-mass': '120 m2/g',
  'volume-per-mass': '0.4 cm3/g',
  density: '1.2 g/cm3',
  'molar-mass': '44.01 g/mol',
  diffusivity: '0.2 cm2/s',
  viscosity: '0.02 cP',
  'thermal-conductivity': '0.2 W/(m K)',
}

const NUMBER_THEN_UNIT =
  /^\s*([-+\u2010-\u2013\u2212]?\s*[\d.,'’\s\u00a0\u2007\u2009\u202f]*\d[.,]?(?:[eEdD][-+\u2212]?\d{1,3}(?![A-Za-zµ]))?(?:\s*[×x·*⋅]\s*10\s*\^?[-+]?[\d⁰¹²³⁴⁵⁶⁷⁸⁹⁻⁺]+)?)\s*(.*?)\s*$/su

/**
 * Quantity behind what a person types or a file states, with what was understood in words.
 *
 * Number and unit by {@link parseNumber} and {@link unitFromAlias}; times also as `2 h 30 min` or `02:30:00`, lengths also as a sieve number.
 * A gas flow that states only the temperature it is counted at, `60 mL/min (20 °C)`, is taken at 101.325 kPa, and that is said.
 * Nothing is guessed that would change the value: an unknown reference state of a gas flow, a pressure that does not say gauge or absolute
 * and a comma that can be two things are handed back to the caller to ask.
 * Source: own table, see unit-table.ts; BIPM, The International System of Units, 9th edition, 2019.
 *
 * @param text - what was written, number and unit [-]
 * @param dimension - the kind of quantity expected [-]
 * @param options - what the caller already knows about the writing [-]
 * @returns the value [SI unit of the dimension] with unit, kind and words, or a sentence that says what to write instead
 * @example `parseQuantity('7,2 mL/min', 'volume-flow')` has valueSi 1.2e-7 and flowReference null
 */
export function parseQuantity(text: string, dimension: Dimension, options: QuantityOptions = {}): QuantityReading {
  if (text.trim() === '')
    return refuse(`Nothing is written; write a value with its unit, for example ${EXAMPLES[dimension]}.`)
  if (dimension === 'time') {
    const compound = parseCompoundTime(text)
    if (compound !== null) return compound
  }
  const split = dimension === 'length' ? (splitVulgarFraction(text) ?? splitNumber(text)) : splitNumber(text)
  if (split === null)
    return refuse(`“${text.trim()}” does not start with a number; write it like ${EXAMPLES[dimension]}.`)
  const number = parseNumber(split.number, options.decimalMark ?? null)
  if (!number.ok) return refuse(number.sentence)
  const alias = split.unit === '' ? (options.defaultUnit ?? '') : split.unit
  if (alias === '' && dimension !== 'fraction')
    return refuse(`“${text.trim()}” has no unit; write one, for example ${EXAMPLES[dimension]}.`)
  if (alias === '' && dimension === 'fraction' && number.value > 1)
    return refuse(
      `“${text.trim()}” without a unit is ${plain(number.value * 100)} %; write ${plain(number.value)} % if that is meant.`,
    )
  if (dimension === 'length' && /^mesh$/iu.test(alias)) return sieveReading(number.value)
  const unit = unitFromAlias(alias, dimension)
  if (unit === null && dimension === 'molar-flow') return molarFlowReading(number.value, alias, options)
  if (unit === null) return refuse(unknownUnit(alias, dimension))
  if (unit.dimension === 'volume-flow' && isPressureAlone(unit))
    return refuse(pressureAlone(`${plain(number.value)} ${unit.label}`))
  const conflict = basisConflict(unit, options)
  if (conflict !== null) return refuse(conflict)
  return readingOf(number.value, unit, options)
}

/**
 * Number and unit of a text that starts with a number.
 *
 * @param text - what was written [-]
 * @returns the two pieces as written, the unit possibly empty [-]; null where the text does not start with a number
 */
export function splitNumber(text: string): { readonly number: string; readonly unit: string } | null {
  const match = NUMBER_THEN_UNIT.exec(text)
  if (match?.[1] === undefined || match[2] === undefined) return null
  // in `5 1/h` the second 1 belongs to the unit
  const reciprocal = match[2].startsWith('/') ? /^(.*\S)\s+1$/su.exec(match[1]) : null
  if (reciprocal?.[1] !== undefined) return { number: reciprocal[1], unit: `1${match[2]}` }
  return { number: match[1], unit: match[2] }
}

// `1/4 in`, `1 1/2 in`: as tubes are sold; `60/80 mesh` is a range
function splitVulgarFraction(text: string): { readonly number: string; readonly unit: string } | null {
  const match = /^\s*(?:(\d{1,3})[\s-]+)?(\d{1,3})\s*[/\u2044]\s*(\d{1,3})\s*([^\d\s].*?)\s*$/su.exec(
    text.replace(/["”″]/u, ' in'),
  )
  const below = Number(match?.[3])
  if (match?.[4] === undefined || below === 0 || /^mesh$/iu.test(match[4])) return null
  return { number: String(Number(match[1] ?? 0) + Number(match[2]) / below), unit: match[4] }
}

function readingOf(value: number, unit: Unit, options: QuantityOptions): QuantityReading {
  const valueSi = unit.toSi(value)
  const written = `${plain(value)}${unit.label === '' ? '' : ` ${unit.label}`}`
  const remark = unit.remark === '' ? '' : `; ${unit.remark}`
  if (!Number.isFinite(valueSi)) return refuse(`“${written}” is too large to be a measured number; check the exponent.`)
  if (unit.dimension === 'temperature') {
    if (valueSi < 0) return refuse(`${written} lies below absolute zero; check the sign and the unit.`)
    return {
      ok: true,
      valueSi,
      unitLabel: unit.label,
      said: `${written}${unit.label === 'K' ? '' : ` = ${plain(valueSi)} K`}${remark}`,
    }
  }
  if (unit.pressureKind !== undefined) {
    if (valueSi < 0 && unit.pressureKind === 'absolute')
      return refuse(`${written} is below vacuum; check the sign, or write gauge.`)
    const kind = unit.pressureKind === 'unstated' ? ', gauge or absolute not stated' : ''
    return {
      ok: true,
      valueSi,
      unitLabel: unit.label,
      said: `${written}${kind} = ${plain(valueSi / 1_000)} kPa`,
      pressureKind: unit.pressureKind,
    }
  }
  if (unit.dimension === 'volume-flow') {
    const flowReference = referenceOf(unit, options)
    const state =
      flowReference === null ? 'no reference state stated' : `counted at ${stateInWords(flowReference)}${assumed(unit)}`
    return { ok: true, valueSi, unitLabel: unit.label, said: `${written}, ${state}${remark}`, flowReference }
  }
  const share = unit.dimension === 'fraction' && unit.label === '' ? ` = ${plain(value * 100)} %` : ''
  return {
    ok: true,
    valueSi,
    unitLabel: unit.label,
    said: `${written}${share}${remark}`,
    ...(unit.fractionOf === undefined ? {} : { fractionOf: unit.fractionOf }),
  }
}

// A volume flow where an amount is wanted: an amount once the reference state is known, a question before.
function molarFlowReading(value: number, alias: string, options: QuantityOptions): QuantityReading {
  const unit = unitFromAlias(alias, 'volume-flow')
  if (unit === null) return refuse(unknownUnit(alias, 'molar-flow'))
  if (isPressureAlone(unit)) return refuse(pressureAlone(`${plain(value)} ${unit.label}`))
  const reference = referenceOf(unit, options)
  if (reference === null)
    return refuse(
      `“${plain(value)} ${unit.label}” is a volume; say at which temperature and pressure it is counted, for example 0 °C and 1013 mbar.`,
    )
  const valueSi = molarFlowFromVolumeFlow(unit.toSi(value), reference)
  const remark = unit.remark === '' ? '' : `; ${unit.remark}`
  return {
    ok: true,
    valueSi,
    unitLabel: unit.label,
    said: `${plain(value)} ${unit.label}, counted at ${stateInWords(reference)}${assumed(unit)} = ${plain(Number((valueSi * 1e6).toPrecision(5)))} µmol/s${remark}`,
    flowReference: reference,
  }
}

// What a unit states of its own goes before what was answered for all flows.
function referenceOf(unit: Unit, options: QuantityOptions): FlowReference | null {
  if (unit.statedTemperatureK !== undefined)
    return { temperatureK: unit.statedTemperatureK, pressurePa: STANDARD_ATMOSPHERE_PA }
  return unit.flowReference ?? options.flowReference ?? null
}

function assumed(unit: Unit): string {
  return unit.statedTemperatureK === undefined ? '' : ' (no pressure stated, so standard pressure)'
}

// `mL/min (1 bar)`: another temperature must not be put beside it.
function isPressureAlone(unit: Unit): boolean {
  return (
    (unit.flowReference ?? null) === null && unit.statedTemperatureK === undefined && /\(.*\d.*\)$/u.test(unit.label)
  )
}

function pressureAlone(written: string): string {
  return `“${written}” states a pressure and no temperature; a volume is counted at both, so write both, as in 60 mL/min (20 °C, 1013 mbar).`
}

function sieveReading(mesh: number): QuantityReading {
  const openingM = meshOpeningM(mesh)
  if (openingM === null)
    return refuse(`${plain(mesh)} mesh is not a sieve of the ASTM E11 series; write the opening, for example 180 µm.`)
  return {
    ok: true,
    valueSi: openingM,
    unitLabel: 'mesh',
    said: `${plain(mesh)} mesh = ${plain(openingM * 1e6)} µm opening (ASTM E11)`,
  }
}

// `2 h 30 min`, `02:30:00`; null when the text is neither.
function parseCompoundTime(text: string): QuantityReading | null {
  const clock = /^\s*(\d+):([0-5]\d):([0-5]\d(?:[.,]\d+)?)\s*$/u.exec(text)
  if (clock?.[1] !== undefined && clock[2] !== undefined && clock[3] !== undefined) {
    const valueSi = Number(clock[1]) * 3_600 + Number(clock[2]) * 60 + Number(clock[3].replace(',', '.'))
    return { ok: true, valueSi, unitLabel: 'h:min:s', said: `${text.trim()} h:min:s = ${plain(valueSi)} s` }
  }
  if (/^\s*\d+:\d{1,2}\s*$/u.test(text))
    return refuse(
      `“${text.trim()}” can be hours and minutes or minutes and seconds; write it like 2 h 30 min or 02:30:00.`,
    )
  const pieces = [...text.matchAll(/(\d+(?:[.,]\d+)?)\s*([A-Za-z]+)\.?/gu)]
  if (pieces.length < 2 || text.replace(/(\d+(?:[.,]\d+)?)\s*([A-Za-z]+)\.?|,|\band\b|\s/gu, '') !== '') return null
  let valueSi = 0
  let smallest = Infinity
  for (const piece of pieces) {
    const unit = unitFromAlias(piece[2] ?? '', 'time')
    const size = unit?.toSi(1) ?? Infinity
    if (unit === null || size >= smallest) return null
    smallest = size
    valueSi += unit.toSi(Number((piece[1] ?? '').replace(',', '.')))
  }
  return { ok: true, valueSi, unitLabel: 's', said: `${text.trim()} = ${plain(valueSi)} s` }
}

function basisConflict(unit: Unit, options: QuantityOptions): string | null {
  const wanted = options.fractionOf
  if (
    wanted !== undefined &&
    unit.fractionOf !== undefined &&
    unit.fractionOf !== 'unstated' &&
    unit.fractionOf !== wanted
  )
    return wanted === 'amount'
      ? `“${unit.label}” is a fraction by mass; a fraction by amount is needed here, in mol% or vol%.`
      : `“${unit.label}” is a fraction by amount; a fraction by mass is needed here, in wt%.`
  const mass = options.massOf ?? 'catalyst'
  if (unit.massOf !== undefined && unit.massOf !== mass)
    return mass === 'catalyst'
      ? `“${unit.label}” is per mass of metal; a value per mass of catalyst is needed here, so multiply by the metal content first.`
      : `“${unit.label}” is per mass of catalyst; a value per mass of metal is needed here, written like µmol gmetal-1 s-1.`
  return null
}

function unknownUnit(alias: string, dimension: Dimension): string {
  const bracket = /[([]([^()[\]]*)[)\]]$/u.exec(alias)
  if (
    bracket?.[1] !== undefined &&
    (dimension === 'molar-flow' || dimension === 'volume-flow') &&
    unitFromAlias(alias.slice(0, bracket.index).trim(), 'volume-flow') !== null
  )
    return `“(${bracket[1]})” is not a state that gas is counted at; write its temperature and pressure, as in 60 mL/min (20 °C, 1013 mbar).`
  // grams of product per gram of catalyst and hour: a mass for a mass, which no table turns into an amount
  if (dimension === 'rate-per-mass' && unitFromAlias(alias, 'frequency') !== null)
    return `“${alias}” is a mass per mass and time, or a rate per site; give the amount made per mass of catalyst, like ${EXAMPLES[dimension]}, by dividing by the molar mass.`
  return `“${alias}” is not a unit of ${dimension.replaceAll('-', ' ')} known here; write it like ${EXAMPLES[dimension]}.`
}

function stateInWords(reference: FlowReference): string {
  return `${plain(reference.temperatureK - 273.15)} °C and ${plain(reference.pressurePa / 1_000)} kPa`
}

// All the digits that matter and none that binary fractions add.
function plain(value: number): string {
  const rounded = Number(value.toPrecision(10))
  const size = Math.abs(rounded)
  if (rounded !== 0 && (size < 1e-4 || size >= 1e9)) return formatNumber(rounded, 4)
  return String(rounded).replace('-', '−')
}

function refuse(sentence: string): QuantityReading {
  return { ok: false, sentence }
}
