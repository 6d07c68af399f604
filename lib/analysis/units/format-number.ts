const SUPERSCRIPTS = '⁰¹²³⁴⁵⁶⁷⁸⁹'

/**
 * A number for a person: a given count of significant digits, a typographic minus, powers of ten as 1.23 × 10⁻⁵.
 *
 * Rounding is of the shown digits only (half away from zero as the decimal expansion of the double has it).
 * Source: ISO 80000-1:2022, clause 7.3.
 *
 * @param value - the number [-]
 * @param significantDigits - digits to show, 1 to 15 [-]
 * @returns the text [-]; `not known` for a value that is not finite
 * @example 0.0000123 with 3 digits is `1.23 × 10⁻⁵`
 */
export function formatNumber(value: number, significantDigits = 4): string {
  if (!Number.isFinite(value)) return 'not known'
  if (value === 0) return '0'
  const digits = Math.min(15, Math.max(1, significantDigits))
  const [mantissa = '0', exponentText = '0'] = value.toExponential(digits - 1).split('e')
  const exponent = Number(exponentText)
  if (exponent < -4 || exponent > 6) return withMinus(`${mantissa} × 10${raised(exponent)}`)
  return withMinus(value.toFixed(Math.min(100, Math.max(0, digits - 1 - exponent))))
}

/**
 * A value with its standard uncertainty, rounded together: two digits of the uncertainty, the value to the same decimal.
 *
 * Source: JCGM 100:2008, clause 7.2.6.
 *
 * @param value - the number [-]
 * @param standardUncertainty - one standard uncertainty in the same unit [-], at least 0; null where none is known
 * @returns text such as `80.00 ± 0.45` [-]; four digits and no ± where the uncertainty is null or zero
 */
export function formatWithUncertainty(value: number, standardUncertainty: number | null): string {
  if (!Number.isFinite(value)) return 'not known'
  if (standardUncertainty === null || !(standardUncertainty > 0) || !Number.isFinite(standardUncertainty))
    return formatNumber(value)
  // exponent of the uncertainty after rounding to two digits: 0.0996 becomes 0.10
  const uncertaintyExponent = Number(standardUncertainty.toExponential(1).split('e')[1] ?? '0')
  const larger = Math.max(Math.abs(value), standardUncertainty)
  const exponent = Number(larger.toExponential(1).split('e')[1] ?? '0')
  if (exponent < -4 || exponent > 6) {
    const scale = Number(`1e${String(exponent)}`)
    const decimals = Math.min(100, Math.max(0, 1 + exponent - uncertaintyExponent))
    return withMinus(
      `(${(value / scale).toFixed(decimals)} ± ${(standardUncertainty / scale).toFixed(decimals)}) × 10${raised(exponent)}`,
    )
  }
  const decimals = Math.min(100, Math.max(0, 1 - uncertaintyExponent))
  return withMinus(`${value.toFixed(decimals)} ± ${standardUncertainty.toFixed(decimals)}`)
}

function withMinus(text: string): string {
  return text.replace(/-/g, '−')
}

function raised(exponent: number): string {
  return [...String(exponent)].map((letter) => (letter === '-' ? '⁻' : (SUPERSCRIPTS[Number(letter)] ?? ''))).join('')
}
