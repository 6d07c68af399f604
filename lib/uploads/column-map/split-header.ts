import { isUnit } from '../find-layout'

export interface SplitHeader {
  readonly label: string
  /** as in the file; empty when the header states none */
  readonly unit: string
}

/** Takes a header apart into its words and its unit: `T_bed [K]`, `Retention / min`, `CO2 flow (mL/min)`, `Temp., °C`, `CH4 in %`. */
export function splitHeader(header: string): SplitHeader {
  const text = header.replace(/ \(\d+\)$/, '').trim()
  const bracket = lastBracket(text)
  if (bracket !== null) {
    const label = text.slice(0, bracket.from).trim()
    // square brackets hold the units row, which is a unit by its place; round ones may hold a remark
    if (bracket.isSquare || isUnit(bracket.inside) || label === '')
      return { label: label === '' ? bracket.inside : label, unit: label === '' ? '' : bracket.inside.slice(0, 60) }
  }
  for (const mark of [' / ', '/', ', ', ' in ', ' ', '_']) {
    const at = text.lastIndexOf(mark)
    if (at <= 0) continue
    const unit = text.slice(at + mark.length).trim()
    // a last letter after a bare space or underscore is a name as often as a unit (`T_C`): only unmistakable units there
    if ((mark === ' ' || mark === '_') && unit.length < 2 && !/^[%°]/.test(unit)) continue
    if ((mark === ' ' || mark === '_') && /^(in|at|a|h|m|no|mol|vol)$/i.test(unit)) continue
    if (isUnit(unit)) return { label: text.slice(0, at).trim(), unit: unit.slice(0, 60) }
  }
  return { label: text, unit: '' }
}

function lastBracket(text: string): { from: number; inside: string; isSquare: boolean } | null {
  const close = text.charAt(text.length - 1)
  if (close !== ']' && close !== ')') return null
  const open = close === ']' ? '[' : '('
  let depth = 0
  for (let i = text.length - 1; i >= 0; i--) {
    if (text.charAt(i) === close) depth++
    else if (text.charAt(i) === open && --depth === 0)
      return { from: i, inside: text.slice(i + 1, -1).trim(), isSquare: close === ']' }
  }
  return null
}

/** Words of a label in lower case without accents: `T_bed`, `TBett`, `Ret.-Zeit` come apart. */
export function labelWords(label: string): string[] {
  return label
    .replace(/ß/g, 'ss')
    .normalize('NFD')
    .replace(/[\u0300-\u036f]/g, '')
    .replace(/(\p{Ll})(\p{Lu})/gu, '$1 $2')
    .toLowerCase()
    .split(/[^\p{L}\p{N}#%]+/u)
    .filter((word) => word !== '')
}
