/** Digits of a formula as subscripts: `CH4` reads CH₄. */
export function speciesLabel(species: string): string {
  return species.replace(/\d/g, (digit) => '₀₁₂₃₄₅₆₇₈₉'[Number(digit)] ?? digit)
}
