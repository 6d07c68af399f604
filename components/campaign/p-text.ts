import { formatFixed } from '@/components/numbers/format-fixed'

/** A probability as tables have it. */
export function pText(pValue: number | null): string {
  if (pValue === null) return '–'
  return pValue < 0.0001 ? '< 0.0001' : formatFixed(pValue, 4)
}
