import { formulaParts } from './formula-parts'

/** A formula in the reading face, with its subscripts and superscripts set. */
export function Formula({ text }: { text: string }) {
  return formulaParts(text).map((part, index) => {
    if (part.place === 'subscript') return <sub key={index}>{part.text}</sub>
    if (part.place === 'superscript') return <sup key={index}>{part.text}</sup>
    return <span key={index}>{part.text}</span>
  })
}
