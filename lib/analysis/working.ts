/** One symbol put into a formula. */
export interface WorkingSymbol {
  readonly symbol: string
  readonly meaning: string
  readonly value: number | null
  /** practical unit in which `value` is given here, for a person to read */
  readonly unit: string
  /** one standard uncertainty in the same unit; null where none is known */
  readonly standardUncertainty: number | null
  /** whether the uncertainty belongs to this number alone, is shared with other numbers, or has a part of either */
  readonly uncertaintyKind: 'own' | 'shared' | 'both' | 'none'
}

/** The full derivation of one number, shown on request and copied as text. */
export interface Working {
  /** for example `Rate at hold 4` */
  readonly title: string
  /** plain text with Unicode sub- and superscripts, for example `r = F_A0 · X / W`; `_x` is set as a subscript */
  readonly formula: string
  readonly symbols: readonly WorkingSymbol[]
  readonly result: WorkingSymbol
  readonly assumptions: readonly string[]
  /** published origin of the formula, or `common practice` */
  readonly source: string
  /** files, rows and injections that went in, in words */
  readonly from: readonly string[]
  /** what was left out, by which rule or by whom, in words */
  readonly leftOut: readonly string[]
  /** further remarks: why this route, what it agrees with */
  readonly notes: readonly string[]
}
