/** A number ready to be set: figures with a typographic minus and thousands apart, power of ten on its own. */
export interface EstimateText {
  readonly value: string
  readonly uncertainty: string | null
  /** power of ten that both are to be multiplied by, or null */
  readonly exponent: string | null
}

const NARROW_SPACE = '\u202f'

/** Figures with a typographic minus, and thousands set apart by a narrow space from five digits on. */
export function setFigures(plain: string): string {
  const [whole = '', decimals] = plain.replace('-', '').split('.')
  const grouped = whole.length > 4 ? whole.replace(/\B(?=(\d{3})+$)/g, NARROW_SPACE) : whole
  return `${plain.startsWith('-') && /[1-9]/.test(plain) ? '\u2212' : ''}${grouped}${decimals === undefined ? '' : `.${decimals}`}`
}

/** Decimal exponent of a number after rounding to this many digits: 0.0996 to two digits is 0.10, exponent −1. */
function exponentOf(value: number, digits: number): number {
  return value === 0
    ? 0
    : Number(
        Math.abs(value)
          .toExponential(digits - 1)
          .split('e')[1] ?? '0',
      )
}

function fixed(value: number, decimals: number): string {
  if (decimals >= 0) return setFigures(value.toFixed(Math.min(100, decimals)))
  // a number whose uncertainty is in the tens or hundreds: rounded there, so that no digit is shown that says nothing
  const step = Number(`1e${String(-decimals)}`)
  return setFigures(String(Math.round(value / step) * step))
}

/**
 * A value and its uncertainty rounded together: two digits of the uncertainty, the value to the same decimal; a value alone to
 * `significantDigits`. Very large and very small numbers carry a power of ten. Only the text is rounded, never what is stored.
 */
export function formatEstimate(value: number, uncertainty: number | null, significantDigits = 4): EstimateText {
  const hasUncertainty = uncertainty !== null && Number.isFinite(uncertainty) && uncertainty > 0
  const size = exponentOf(
    Math.max(Math.abs(value), hasUncertainty ? uncertainty : 0),
    hasUncertainty ? 2 : significantDigits,
  )
  const isScaled = size < -3 || size > 6
  const scale = isScaled ? Number(`1e${String(size)}`) : 1
  const exponent = isScaled ? setFigures(String(size)) : null
  if (!hasUncertainty) {
    const decimals = significantDigits - 1 - (isScaled ? 0 : exponentOf(value, significantDigits))
    return { value: fixed(value / scale, Math.max(0, decimals)), uncertainty: null, exponent }
  }
  const decimals = 1 - exponentOf(uncertainty / scale, 2)
  return { value: fixed(value / scale, decimals), uncertainty: fixed(uncertainty / scale, decimals), exponent }
}

/** The same as one line of text, for titles, files and readers that take no markup. */
export function estimateAsText(value: number | null, uncertainty: number | null, unit = ''): string {
  if (value === null || !Number.isFinite(value)) return 'not known'
  const text = formatEstimate(value, uncertainty)
  const body = text.uncertainty === null ? text.value : `${text.value} ± ${text.uncertainty}`
  const scaled =
    text.exponent === null ? body : `${text.uncertainty === null ? body : `(${body})`} × 10^${text.exponent}`
  return unit === '' ? scaled : `${scaled} ${unit}`
}
