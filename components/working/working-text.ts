import { withSourceWords } from './source-words'
import { type Working, type WorkingSymbol } from '@/lib/analysis/working'
import { estimateAsText, formatEstimate, setFigures, type EstimateText } from '@/lib/domain/format-estimate'

const SUPERSCRIPTS: Readonly<Record<string, string>> = { '−': '⁻', '-': '⁻' }

function withPower(text: EstimateText): string {
  if (text.exponent === null) return text.value
  const power = [...text.exponent].map((sign) => SUPERSCRIPTS[sign] ?? '⁰¹²³⁴⁵⁶⁷⁸⁹'[Number(sign)] ?? sign).join('')
  return `${text.value} × 10${power}`
}

/** A number without an uncertainty: all its figures, six at most. */
function exactFigures(value: number): string {
  const plain = String(Number(value.toPrecision(6)))
  return plain.includes('e') ? withPower(formatEstimate(value, null, 6)) : setFigures(plain)
}

/** Value of a symbol to what its uncertainty justifies; one that is exact is given with six figures at most. */
export function symbolValue(symbol: WorkingSymbol): string {
  if (symbol.value === null) return 'not known'
  const u = symbol.standardUncertainty
  // the uncertainty stands in its own column, so only the value's rounding is taken from it
  const rounded = u !== null && u > 0 ? withPower(formatEstimate(symbol.value, u)) : exactFigures(symbol.value)
  return symbol.unit === '' ? rounded : `${rounded} ${symbol.unit}`
}

const KIND_WORDS = { own: '', shared: ' shared', both: ' in all', none: '' } as const

/** `± 1.0 % shared`, `± 1.8 % in all` (own and shared together), `± 0.6 %`, or nothing. */
export function symbolUncertainty(symbol: WorkingSymbol): string {
  const u = symbol.standardUncertainty
  if (symbol.value === null || u === null || !(u > 0)) return ''
  const size = Math.abs(symbol.value)
  const relative = size > 0 ? u / size : Infinity
  const shared = KIND_WORDS[symbol.uncertaintyKind]
  // a scale with a zero of its own has no percent
  if (symbol.unit === '°C' || relative > 0.3 || relative < 1e-6)
    return `± ${estimateAsText(u, null, symbol.unit === '°C' ? 'K' : '')}${shared}`
  const percent = relative * 100
  return `± ${percent >= 0.095 ? percent.toFixed(1) : percent.toPrecision(1)} %${shared}`
}

const list = (title: string, lines: readonly string[]) =>
  lines.length > 0 ? [title, ...lines.map((line) => `  ${withSourceWords(line)}`)] : []

/** The whole derivation as plain text, for a notebook or a mail. */
export function workingText(working: Working): string {
  const given = working.symbols.map((symbol) => {
    const uncertainty = symbolUncertainty(symbol)
    return `  ${symbol.symbol} = ${symbolValue(symbol)}${uncertainty === '' ? '' : ` (${uncertainty})`}: ${symbol.meaning}`
  })
  const resultUncertainty = symbolUncertainty(working.result)
  return [
    working.title,
    working.formula,
    ...given,
    `Result: ${working.result.symbol} = ${symbolValue(working.result)}${resultUncertainty === '' ? '' : ` (${resultUncertainty})`}`,
    ...list('Assumptions', working.assumptions),
    ...list('Why', working.notes),
    ...list('From', working.from),
    ...list('Left out', working.leftOut),
    `Formula: ${working.source}`,
  ].join('\n')
}
