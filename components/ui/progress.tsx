/** How far a long task is, in words and as a bar. Without a total the bar only says that it goes on. */
export function Progress({
  label,
  value,
  max = 1,
  said,
}: {
  readonly label: string
  readonly value: number | null
  readonly max?: number
  /** for example `3.2 of 9.8 MB` */
  readonly said?: string
}) {
  return (
    <div className="grid gap-1">
      <div className="flex justify-between gap-4 text-[13px] text-ink-2">
        <span>{label}</span>
        {said === undefined ? null : <span>{said}</span>}
      </div>
      <progress
        className="bar-progress"
        aria-label={label}
        max={max}
        {...(value === null ? {} : { value: Math.min(max, Math.max(0, value)) })}
      />
    </div>
  )
}
