import { classNames } from '@/components/ui/class-names'
import { type Caution } from '@/lib/analysis/caution'

const KINDS = {
  grave: ['border-fault bg-fault-wash', 'text-fault'],
  caution: ['border-doubt bg-doubt-wash', 'text-doubt'],
  note: ['border-line-strong bg-well', 'text-ink'],
} as const

/** Cautions in full sentences, with their source, where the hand is. */
export function CautionList({
  cautions,
  className,
}: {
  readonly cautions: readonly Caution[]
  readonly className?: string
}) {
  if (cautions.length === 0) return null
  return (
    <ul className={classNames('grid gap-2', className)}>
      {cautions.map((caution) => {
        const [box, head] = KINDS[caution.severity]
        return (
          <li key={`${caution.code} ${caution.tag}`} className={classNames('border-l-[3px] px-3 py-2', box)}>
            <strong className={classNames('font-semibold first-letter:uppercase', head)}>{caution.tag}.</strong>{' '}
            {caution.sentence}
            {caution.source === '' ? null : <span className="block text-[13px] text-ink-2">{caution.source}</span>}
          </li>
        )
      })}
    </ul>
  )
}
