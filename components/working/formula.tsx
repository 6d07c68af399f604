import { formulaParts } from './formula-parts'

/** A formula in the reading face, with its subscripts set. */
export function Formula({ text }: { text: string }) {
  return formulaParts(text).map((part, index) =>
    part.isSubscript ? (
      <sub key={index} className="text-[.68em] leading-none">
        {part.text}
      </sub>
    ) : (
      <span key={index}>{part.text}</span>
    ),
  )
}
