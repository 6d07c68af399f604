/** A number with this many decimals, a true minus sign, and no negative zero. Not finite gives a dash. */
export function formatFixed(value: number, decimals: number): string {
  if (!Number.isFinite(value)) return '–'
  const text = value.toFixed(Math.max(0, Math.min(12, decimals)))
  return /^-[0.]+$/.test(text) ? text.slice(1) : text.replace('-', '−')
}
