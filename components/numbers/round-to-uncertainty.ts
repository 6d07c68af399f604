import { formatFixed } from './format-fixed'

export interface RoundedValue {
  readonly value: string
  /** empty where no uncertainty is known */
  readonly uncertainty: string
}

const SUPERSCRIPTS: Readonly<Record<string, string>> = {
  '-': '⁻',
  '0': '⁰',
  '1': '¹',
  '2': '²',
  '3': '³',
  '4': '⁴',
  '5': '⁵',
  '6': '⁶',
  '7': '⁷',
  '8': '⁸',
  '9': '⁹',
}

/** Decimal exponent of the leading digit: 0 for 1 to 9.99, −2 for 0.05. */
function leadingExponent(value: number): number {
  return Math.floor(Math.log10(Math.abs(value)))
}

/** Decimals to which an uncertainty is stated: two figures when it starts with 1 or 2 (one would round by up to a third), else one. */
export function decimalsForUncertainty(uncertainty: number): number {
  const exponent = leadingExponent(uncertainty)
  // to two figures first: 0.0996 is 0.10, not 0.1
  const twoFigures = Number((uncertainty / 10 ** exponent).toPrecision(2))
  const isCarried = twoFigures >= 10
  const lead = isCarried ? 1 : Math.floor(twoFigures)
  const place = isCarried ? exponent + 1 : exponent
  return lead <= 2 ? 1 - place : -place
}

/**
 * Value and uncertainty as people write them: the uncertainty to one or two figures, the value to the same decimal place.
 * Without an uncertainty the value gets four figures. Very large or small pairs are written with a power of ten.
 */
export function roundToUncertainty(value: number, uncertainty: number | null): RoundedValue {
  if (!Number.isFinite(value)) return { value: '–', uncertainty: '' }
  const size = Math.max(Math.abs(value), uncertainty ?? 0)
  const exponent = size > 0 ? leadingExponent(size) : 0
  if (exponent >= 6 || exponent < -4) {
    const factor = 10 ** exponent
    const scaled = roundToUncertainty(value / factor, uncertainty === null ? null : uncertainty / factor)
    const power = `×10${[...String(exponent)].map((character) => SUPERSCRIPTS[character] ?? character).join('')}`
    return scaled.uncertainty === ''
      ? { value: `${scaled.value}${power}`, uncertainty: '' }
      : { value: `${scaled.value}${power}`, uncertainty: `${scaled.uncertainty}${power}` }
  }
  if (uncertainty === null || !(uncertainty > 0) || !Number.isFinite(uncertainty)) {
    return { value: formatFixed(value, Math.max(0, 3 - exponent)), uncertainty: '' }
  }
  const decimals = decimalsForUncertainty(uncertainty)
  if (decimals < 0) {
    // the place that counts lies left of the point: 1,234 ± 50 is 1230 ± 50
    const step = 10 ** -decimals
    return {
      value: formatFixed(Math.round(value / step) * step, 0),
      uncertainty: formatFixed(Math.round(uncertainty / step) * step, 0),
    }
  }
  return { value: formatFixed(value, decimals), uncertainty: formatFixed(uncertainty, decimals) }
}
