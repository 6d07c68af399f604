import { symbolPath, type SampleSymbol } from './sample-symbols'

/** The sample's shape before its code. */
export function SampleSymbolMark({ symbol }: { symbol: SampleSymbol }) {
  return (
    <svg width="14" height="14" viewBox="0 0 14 14" aria-hidden="true" className="inline-block shrink-0">
      <path d={symbolPath(symbol, 7, 7, 5)} fill="var(--ink)" />
    </svg>
  )
}
