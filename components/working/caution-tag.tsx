import { type Caution } from '@/lib/analysis/caution'

const tones = {
  note: 'bg-well text-ink-2',
  caution: 'bg-doubt-wash text-doubt',
  grave: 'bg-fault-wash text-fault',
} as const
const weights = { note: 'Note', caution: 'Caution', grave: 'Grave caution' } as const

/** A number and its unit stay on one line. */
const keepUnits = (words: string) => words.replace(/(\d) (?=[%°])/g, '$1\u00a0')

/** A caution in its own short words; the full sentence is there for a pointer and for a screen reader. */
export function CautionTag({ caution }: { caution: Caution }) {
  return (
    <span
      className={`inline-block max-w-full rounded-[3px] px-1.5 text-[12.5px] leading-[19px] whitespace-normal ${tones[caution.severity]}`}
      title={caution.sentence}
    >
      <span className="sr-only">{weights[caution.severity]}: </span>
      {keepUnits(caution.tag)}
    </span>
  )
}
