import { parseNumber } from '@/lib/analysis/units/parse-number'

type Percent = { readonly ok: true; readonly value: number | null } | { readonly ok: false; readonly sentence: string }

/** A typed uncertainty in per cent as a fraction: `1,5` or `1.5 %` is 0.015; empty is not stated. */
export function readPercent(text: string): Percent {
  const bare = text.trim().replace(/\s*%$/, '')
  if (bare === '') return { ok: true, value: null }
  const read = parseNumber(bare, null)
  if (!read.ok) return { ok: false, sentence: read.sentence }
  return read.value >= 0 && read.value <= 100
    ? { ok: true, value: read.value / 100 }
    : { ok: false, sentence: 'Between 0 and 100 %.' }
}
