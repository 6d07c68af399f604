import { type Caution } from '@/lib/analysis/caution'
import { CautionTag } from './caution-tag'

/** Cautions written out: tag, sentence, and where the limit comes from. */
export function CautionList({ cautions }: { cautions: readonly Caution[] }) {
  if (cautions.length === 0) return <p className="text-ink-3">None.</p>
  return (
    <ul className="m-0 list-none space-y-2 p-0">
      {cautions.map((caution, index) => (
        <li key={`${caution.code}-${index}`}>
          <CautionTag caution={caution} /> <span>{caution.sentence}</span>
          {caution.source === '' ? null : (
            <span className="block text-[12.5px] text-ink-3">Limit: {caution.source}</span>
          )}
        </li>
      ))}
    </ul>
  )
}
