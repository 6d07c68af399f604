import { type Dimension, DIMENSIONS } from './dimension'
import { type FlowReference } from './flow-reference'
import {
  ENERGY_PER_AMOUNT_WORDS,
  type Exponents,
  EXPRESSION_ALIASES,
  TEMPERATURE_SCALES,
  UNIT_WORDS,
  type UnitWord,
} from './unit-table'

/** Whether a pressure is counted from vacuum or from the surroundings, or the unit does not say. */
export type PressureKind = 'absolute' | 'gauge' | 'unstated'

/** A unit as read from an alias. */
export interface Unit {
  /** the unit in our own spelling, for printing */
  readonly label: string
  readonly dimension: Dimension
  readonly toSi: (x: number) => number
  readonly fromSi: (x: number) => number
  /** pressures only; a gauge value stays a gauge value in pascal until a barometer is added */
  readonly pressureKind?: PressureKind
  /** volume flows only: the reference state the unit names, null where it names none */
  readonly flowReference?: FlowReference | null
  /** volume flows only: a temperature is stated and no pressure with it */
  readonly statedTemperatureK?: number
  /** volume flows only: the word says "standard" or "normal", whether or not it says which state */
  readonly isStandardVolume?: boolean
  /** fractions only */
  readonly fractionOf?: 'amount' | 'mass' | 'unstated'
  /** per-mass quantities only: the mass is of the metal and not of the catalyst */
  readonly massOf?: 'catalyst' | 'metal'
  /** what had to be assumed about the spelling, in words; empty when nothing was */
  readonly remark: string
}

const WORD_OF = new Map<string, UnitWord>(UNIT_WORDS.flatMap((word) => word.aliases.map((alias) => [alias, word])))

const PRESSURE_SUFFIX =
  /^(.*?(?:[A-Za-z]|cm-?2|cm\^?2))(?:[ _-]?[([](a|abs|absolute|A|g|G|gauge|ga|rel|ü|Ü)\.?[)\]]|[ _-](a|abs|abs\.|absolute|A|g|G|gauge|ga|rel|ü|Ü)|(abs|a|A|g|G|ü))$/u
const GAUGE = new Set(['g', 'G', 'gauge', 'ga', 'rel', 'ü', 'Ü'])

/**
 * Unit behind a spelling, by an exact table of whole words, products of powers of them, and the trade words for pressures and gas flows.
 *
 * Spellings of µ (U+00B5, U+03BC, `u`), superscript or plain exponents, middle dots, `per` and `/` are all read; case is never guessed.
 * Two slashes in a row divide twice; a product behind a slash needs brackets: `µmol/(g s)`.
 * Source: own table, see unit-table.ts; BIPM, The International System of Units, 9th edition, 2019.
 *
 * @param alias - the unit as written in a file or form [-]
 * @param dimension - the kind of quantity it must be of [-]
 * @returns the unit with conversions to and from SI [SI unit of the dimension], or null where the spelling is not in the table or is of another kind
 * @example `unitFromAlias('µmol g⁻¹ s⁻¹', 'rate-per-mass')?.toSi(1)` is 0.001
 */
export function unitFromAlias(alias: string, dimension: Dimension): Unit | null {
  const text = normaliseUnitText(alias)
  switch (dimension) {
    case 'temperature':
      return temperatureUnit(text)
    case 'temperature-difference':
      return temperatureDifferenceUnit(text)
    case 'pressure':
      return pressureUnit(text)
    case 'volume-flow':
      return volumeFlowUnit(text)
    case 'energy-per-amount':
      return energyPerAmountUnit(text)
    case 'fraction':
      return text === '' ? unitOf(productOf('fraction'), dimension, {}) : fractionUnit(text)
    case 'temperature-rate':
      return unitOf(productOf(text.replace(/^(°|deg ?)?C(?=[ /])/u, 'K').replace(/^°K/u, 'K')), dimension, {})
    default:
      return unitOf(productOf(text), dimension, {})
  }
}

/**
 * One spelling for the many ways a unit is typed: one micro sign, plain exponents, a plain minus, single spaces for dots and crosses.
 *
 * @param text - unit as written [-]
 * @returns the same unit in plain letters [-]
 */
export function normaliseUnitText(text: string): string {
  return text
    .replace(/[º˚]/gu, '°')
    .normalize('NFKC')
    .replace(/μ/gu, 'µ')
    .replace(/[\u2010-\u2014\u2212]/gu, '-')
    .replace(/[·⋅•∙×*]/gu, ' ')
    .replace(/\^\(?(-?\d)\)?/gu, '$1')
    .replace(/\bper\b/gu, '/')
    .replace(/\bstd\.? (?=(?:mL|ml|cm3|cc|L|l|m3|ft3)(?:[-\s/]|$))/gu, 'std')
    .replace(/\b(k?g|mg)[ _]?\(?(?:cat|catalyst)\.?\)?(?=$|[-\s/)\d])/gu, '$1cat')
    .replace(/\b(k?g|mg)[ _]?\(?(?:metal|Me)\)?(?=$|[-\s/)\d])/gu, '$1metal')
    .replace(/([A-Za-z0-9])\.(?=[A-Za-zµ])/gu, (whole, before: string) =>
      /[A-Za-z0-9]/.test(before) ? `${before} ` : whole,
    )
    .replace(/\s*\/\s*/gu, '/')
    .replace(/\s+/gu, ' ')
    .trim()
}

interface Product {
  readonly numerator: number
  readonly denominator: number
  readonly exponents: Exponents
  readonly parts: readonly { readonly word: UnitWord; readonly power: number }[]
}

// Product of powers of table words, or null when a word is not in the table or the expression can be read two ways.
function productOf(text: string): Product | null {
  const expression = (Object.hasOwn(EXPRESSION_ALIASES, text) ? EXPRESSION_ALIASES[text] : undefined) ?? text
  const sides = expression.split('/')
  const parts: { word: UnitWord; power: number }[] = []
  for (const [index, side] of sides.entries()) {
    const bracketed = /^\((.*)\)$/.exec(side)?.[1]
    const words = (bracketed ?? side).split(' ').filter((piece) => piece !== '')
    if (words.length === 0) return null
    // "µmol/g s" can be per gram and second or per gram times second: not guessed
    if (index > 0 && words.length > 1 && bracketed === undefined) return null
    for (const piece of words) {
      const part = powerOf(piece)
      if (part === null) return null
      parts.push({ word: part.word, power: index === 0 ? part.power : -part.power })
    }
  }
  let numerator = 1
  let denominator = 1
  const exponents: [number, number, number, number, number] = [0, 0, 0, 0, 0]
  for (const { word, power } of parts) {
    for (let i = 0; i < Math.abs(power); i += 1) {
      numerator *= power > 0 ? word.numerator : word.denominator
      denominator *= power > 0 ? word.denominator : word.numerator
    }
    word.exponents.forEach((exponent, k) => {
      exponents[k] = (exponents[k] ?? 0) + exponent * power
    })
  }
  return { numerator, denominator, exponents, parts }
}

function powerOf(piece: string): { word: UnitWord; power: number } | null {
  const whole = WORD_OF.get(piece)
  if (whole !== undefined) return { word: whole, power: 1 }
  const match = /^(.*?)(-?[1-4])$/u.exec(piece)
  const word = WORD_OF.get(match?.[1] ?? '')
  return word === undefined || word.label === '' || match?.[2] === undefined ? null : { word, power: Number(match[2]) }
}

function unitOf(product: Product | null, dimension: Dimension, more: Partial<Unit>): Unit | null {
  if (product === null) return null
  const wanted = DIMENSIONS[dimension]
  if (!wanted.every((exponent, index) => exponent === product.exponents[index])) return null
  const isPerMass = product.parts.some(({ word, power }) => power < 0 && word.exponents[0] === 1)
  const isMetal = product.parts.some(({ word }) => word.massOf === 'metal')
  return {
    label: labelOf(product),
    dimension,
    toSi: (x) => (x * product.numerator) / product.denominator,
    fromSi: (x) => (x * product.denominator) / product.numerator,
    ...(isPerMass ? { massOf: isMetal ? 'metal' : 'catalyst' } : {}),
    remark: '',
    ...more,
  }
}

// `mL/min` for one divisor, `µmol g⁻¹ s⁻¹` for more.
function labelOf(product: Product): string {
  const shown = product.parts.filter(({ word }) => word.label !== '')
  const below = shown.filter(({ power }) => power < 0)
  const first = shown[0]
  const isSimple = shown.length === 2 && below.length === 1 && first !== undefined && first.power > 0
  return shown
    .map(({ word, power }, index) => {
      if (isSimple && index === 1) return `/${word.label}${superscript(-power)}`
      return `${index === 0 ? '' : ' '}${word.label}${superscript(power)}`
    })
    .join('')
}

function superscript(power: number): string {
  if (power === 1) return ''
  return [...String(power)].map((letter) => (letter === '-' ? '⁻' : ('⁰¹²³⁴⁵⁶⁷⁸⁹'[Number(letter)] ?? ''))).join('')
}

function temperatureUnit(text: string): Unit | null {
  const scale = TEMPERATURE_SCALES.find((candidate) => candidate.aliases.includes(text))
  if (scale === undefined) return null
  const bare = text === 'C' || text === 'F' || text === 'deg' || text === '°' || text === '(C)'
  return {
    label: scale.label,
    dimension: 'temperature',
    toSi: (x) => ((x + scale.shift) * scale.numerator) / scale.denominator,
    fromSi: (x) => (x * scale.denominator) / scale.numerator - scale.shift,
    remark: bare ? `“${text}” read as ${scale.label}` : '',
  }
}

function temperatureDifferenceUnit(text: string): Unit | null {
  const scale = TEMPERATURE_SCALES.find((candidate) => candidate.aliases.includes(text))
  if (scale === undefined) return null
  return {
    label: scale.label === '°C' ? 'K' : scale.label,
    dimension: 'temperature-difference',
    toSi: (x) => (x * scale.numerator) / scale.denominator,
    fromSi: (x) => (x * scale.denominator) / scale.numerator,
    remark: '',
  }
}

function pressureUnit(text: string): Unit | null {
  const plain = unitOf(productOf(text), 'pressure', { pressureKind: 'unstated' })
  if (plain !== null) return plain
  const match = PRESSURE_SUFFIX.exec(text)
  const base = match?.[1]
  const suffix = match?.[2] ?? match?.[3] ?? match?.[4]
  if (base === undefined || suffix === undefined) return null
  const pressureKind: PressureKind = GAUGE.has(suffix) ? 'gauge' : 'absolute'
  const unit = unitOf(productOf(base.trim()), 'pressure', { pressureKind })
  return unit === null ? null : { ...unit, label: `${unit.label} ${pressureKind === 'gauge' ? 'gauge' : 'absolute'}` }
}

function energyPerAmountUnit(text: string): Unit | null {
  const special = Object.hasOwn(ENERGY_PER_AMOUNT_WORDS, text) ? ENERGY_PER_AMOUNT_WORDS[text] : undefined
  if (special === undefined) return unitOf(productOf(text), 'energy-per-amount', {})
  return {
    label: special.label,
    dimension: 'energy-per-amount',
    toSi: (x) => x * special.factor,
    fromSi: (x) => x / special.factor,
    remark: text === 'K' ? 'read as an activation energy divided by the gas constant' : '',
  }
}

function fractionUnit(text: string): Unit | null {
  const joined = text.replace(/^(mol|vol|Vol|wt|mass|mole) %$/u, '$1%').replace(/^(Vol|Gew)\.? ?-? ?%$/u, '$1.-%')
  const product = productOf(joined)
  const unit = unitOf(product, 'fraction', {})
  if (unit === null || product === null) return null
  const kinds = product.parts.flatMap(({ word }) => (word.fractionOf === undefined ? [] : [word.fractionOf]))
  const isAmountRatio = product.parts.length === 2 && product.parts.every(({ word }) => word.exponents[3] === 1)
  const isMassRatio = product.parts.length === 2 && product.parts.every(({ word }) => word.exponents[0] === 1)
  return { ...unit, fractionOf: kinds[0] ?? (isAmountRatio ? 'amount' : isMassRatio ? 'mass' : 'unstated') }
}

function volumeFlowUnit(text: string): Unit | null {
  const { base, qualifier } = splitQualifier(text)
  const product = productOf(base)
  const volume = product?.parts.find(({ word }) => word.exponents[1] === 3 || word.exponents[1] === 1)?.word
  const named = volume?.standardVolume
  const unit = unitOf(product, 'volume-flow', {
    flowReference: named ?? null,
    isStandardVolume: named !== undefined,
  })
  if (unit === null || qualifier === '') return unit
  const stated = referenceFromText(qualifier)
  if (stated === null) return null
  if (stated === 'not-stated') {
    const statedTemperatureK = temperatureAlone(qualifier)
    return {
      ...unit,
      label: `${unit.label} (${qualifier})`,
      isStandardVolume: true,
      ...(statedTemperatureK === null ? {} : { statedTemperatureK }),
      remark: /\d/u.test(qualifier) ? '' : `“${qualifier}” is used for several states`,
    }
  }
  return { ...unit, label: `${unit.label} (${qualifier})`, flowReference: stated, isStandardVolume: true }
}

// `mL/min (0 °C, 1013 mbar)`, `mL/min STP`, `L/h @ 20 °C, 1 atm` → the unit and what is said about its state.
function splitQualifier(text: string): { base: string; qualifier: string } {
  const bracket = /^(.*?)\s*[([]([^()[\]]*)[)\]]$/u.exec(text)
  if (bracket?.[1] !== undefined && bracket[2] !== undefined && !bracket[1].endsWith('/'))
    return { base: bracket[1].trim(), qualifier: bracket[2].trim() }
  const inside = /^(.*?)\s*[([](STP|NTP|n|s|N|S|norm|std)[)\]](.*)$/u.exec(text)
  if (inside?.[1] !== undefined && inside[3] !== undefined)
    return { base: `${inside[1]}${inside[3]}`.trim(), qualifier: inside[2] ?? '' }
  const at = /^(.*?)\s*(?:@|\bat\b)\s*(.+)$/u.exec(text)
  if (at?.[1] !== undefined && at[2] !== undefined) return { base: at[1].trim(), qualifier: at[2].trim() }
  const wordAfter = /^(.*?)\s+(STP|NTP|norm|std|standard|normal)$/u.exec(text)
  if (wordAfter?.[1] !== undefined && wordAfter[2] !== undefined) return { base: wordAfter[1], qualifier: wordAfter[2] }
  return { base: text, qualifier: '' }
}

// `20 °C` with no pressure beside it, in kelvin; null for anything else.
function temperatureAlone(text: string): number | null {
  const match = /^(-?\d+(?:[.,]\d+)?)\s*(\S.*)$/u.exec(text)
  const kelvin = temperatureUnit(match?.[2] ?? '-')?.toSi(Number((match?.[1] ?? '').replace(',', '.')))
  return kelvin !== undefined && kelvin > 0 ? kelvin : null
}

// A state in words, `not-stated` where the word is used for several states, null where it is not about a state at all.
function referenceFromText(text: string): FlowReference | 'not-stated' | null {
  if (/^(n|N|norm|normal)$/u.test(text)) return WORD_OF.get('Nm3')?.standardVolume ?? null
  if (/^(s|S|std|standard|STP|NTP|stp|ntp)$/u.test(text)) return 'not-stated'
  const pieces = text.split(/\s*(?:;|,(?!\d)|\band\b|&|\/)\s*/u).filter((piece) => piece !== '')
  let temperatureK: number | null = null
  let pressurePa: number | null = null
  for (const piece of pieces) {
    const match = /^(-?\d+(?:[.,]\d+)?)\s*(.+)$/u.exec(piece.trim())
    if (match?.[1] === undefined || match[2] === undefined) return null
    const value = Number(match[1].replace(',', '.'))
    const temperature = temperatureUnit(match[2])
    const pressure = pressureUnit(match[2])
    if (temperature !== null) temperatureK = temperature.toSi(value)
    else if (pressure !== null && pressure.pressureKind !== 'gauge') pressurePa = pressure.toSi(value)
    else return null
  }
  if (temperatureK === null && pressurePa === null) return null
  if (temperatureK === null || pressurePa === null) return 'not-stated'
  return temperatureK > 0 && pressurePa > 0 ? { temperatureK, pressurePa } : null
}
