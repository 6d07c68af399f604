/**
 * A number as words in a sentence carry it: so many significant digits, a true minus sign, no exponent between 1e-4 and 1e6.
 *
 * @param value - any number [-]
 * @param digits - significant digits, 1 to 15 [-]
 * @returns the text [-]
 */
export function numberText(value: number, digits = 3): string {
  if (!Number.isFinite(value)) return 'not known'
  const rounded = Number(value.toPrecision(digits))
  const size = Math.abs(rounded)
  if (size !== 0 && (size < 1e-4 || size >= 1e6)) return rounded.toExponential(digits - 1).replaceAll('-', '−')
  const [, decimals = ''] = value.toPrecision(digits).split('.')
  const text = value.toPrecision(digits).includes('e') ? String(rounded) : rounded.toFixed(decimals.length)
  return text.replace('-', '−')
}

/**
 * A probability as words carry it.
 *
 * @param p - between 0 and 1 [-]
 * @returns the text, `below 0.0001` where smaller [-]
 */
export function probabilityText(p: number): string {
  return p < 0.0001 ? 'below 0.0001' : numberText(p, p < 0.1 ? 1 : 2)
}
