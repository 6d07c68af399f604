import { formatEstimate } from '@/lib/domain/format-estimate'

/** A number as it may be read: value large, uncertainty small beside it, both rounded to two digits of the uncertainty. */
export function ValueWithUncertainty({
  value,
  uncertainty,
  unit,
  significantDigits = 4,
}: {
  /** null where it could not be computed */
  readonly value: number | null
  /** in the unit of the value; null where none is known */
  readonly uncertainty: number | null
  readonly unit?: string
  /** digits of a value without uncertainty */
  readonly significantDigits?: number
}) {
  if (value === null || !Number.isFinite(value)) return <span className="text-ink-3">not known</span>
  const text = formatEstimate(value, uncertainty, significantDigits)
  return (
    <span className="whitespace-nowrap tabular-nums">
      {text.exponent !== null && text.uncertainty !== null ? '(' : null}
      {text.value}
      {text.uncertainty === null ? null : <span className="text-[0.84em] text-ink-2"> ± {text.uncertainty}</span>}
      {text.exponent === null ? null : (
        <>
          {text.uncertainty === null ? '' : ')'} × 10<sup>{text.exponent}</sup>
        </>
      )}
      {unit === undefined || unit === '' ? null : <span className="text-ink-2"> {unit}</span>}
    </span>
  )
}
