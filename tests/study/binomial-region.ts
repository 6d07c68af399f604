/**
 * Counts that a fair trial of the given probability shows with all but the stated chance, exactly: the smallest region that
 * leaves at most half of it on either side.
 */
export function binomialRegion(
  count: number,
  probability: number,
  level = 0.001,
): { readonly low: number; readonly high: number } {
  const odds = Math.log(probability) - Math.log1p(-probability)
  // probabilities of all counts, on a logarithmic scale from the recursion p(k+1)/p(k) = (n − k)/(k + 1) · odds
  const logs = [count * Math.log1p(-probability)]
  for (let k = 0; k < count; k += 1) logs.push((logs[k] ?? NaN) + Math.log(count - k) - Math.log(k + 1) + odds)
  let low = 0
  let below = Math.exp(logs[0] ?? NaN)
  while (below <= level / 2) {
    low += 1
    below += Math.exp(logs[low] ?? NaN)
  }
  let high = count
  let above = Math.exp(logs[count] ?? NaN)
  while (above <= level / 2) {
    high -= 1
    above += Math.exp(logs[high] ?? NaN)
  }
  return { low, high }
}
