/** Twelve significant digits, so that agreement can be seen with the eye. */
export function longNumber(value: number | null): string {
  if (value === null) return 'none'
  return String(Number(value.toPrecision(12))).replaceAll('-', '−')
}

/** A relative error: two digits, or that there is none to see. */
export function errorText(value: number | null): string {
  if (value === null) return 'no number'
  if (value === 0) return '0'
  return value
    .toExponential(1)
    .replace('e-', ' × 10⁻')
    .replace(/⁻(\d+)/, (_whole, digits: string) => `⁻${raised(digits)}`)
}

function raised(digits: string): string {
  return [...digits].map((digit) => '⁰¹²³⁴⁵⁶⁷⁸⁹'[Number(digit)] ?? '').join('')
}
