const BELOW = '₀₁₂₃₄₅₆₇₈₉'

/** A formula as it is set: `CO2` becomes CO₂. */
export function speciesText(formula: string): string {
  return formula.replace(/(?<=[A-Za-z)])\d+/g, (digits) =>
    [...digits].map((digit) => BELOW[Number(digit)] ?? '').join(''),
  )
}
