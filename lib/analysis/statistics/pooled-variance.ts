/**
 * Variance of one measurement from the scatter inside several groups.
 *
 * s^2 = sum over groups of sum (v - group mean)^2 / sum (m - 1)
 * Assumes the same scatter in every group; group means may differ.
 * Source: ISO 5725-2:2019, section 7.4.
 *
 * @param groups - values of each group; groups of one value add nothing [any unit]
 * @returns the variance and its degrees of freedom; null where no group has two values [unit squared]
 */
export function poolVariance(
  groups: readonly (readonly number[])[],
): { readonly variance: number; readonly degreesOfFreedom: number } | null {
  let squares = 0
  let degreesOfFreedom = 0
  for (const group of groups) {
    if (group.length < 2) continue
    let mean = 0
    for (const value of group) mean += value
    mean /= group.length
    for (const value of group) squares += (value - mean) * (value - mean)
    degreesOfFreedom += group.length - 1
  }
  return degreesOfFreedom > 0 ? { variance: squares / degreesOfFreedom, degreesOfFreedom } : null
}
