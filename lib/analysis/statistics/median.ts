/**
 * Median of a set of numbers.
 *
 * The middle one of n values in order, or the mean of the two in the middle; values that are not finite are passed over. Found by partition, without
 * sorting the whole.
 * Source: C. A. R. Hoare, Commun. ACM 4 (1961) 321, doi:10.1145/366622.366647 (algorithm 65, find).
 *
 * @param values - in any order; left as they are [any unit]
 * @returns the median; NaN where no value is finite [same unit]
 */
export function median(values: ArrayLike<number>): number {
  const finite = new Float64Array(values.length)
  let count = 0
  for (let i = 0; i < values.length; i++) {
    const value = values[i] ?? Number.NaN
    if (Number.isFinite(value)) finite[count++] = value
  }
  if (count === 0) return Number.NaN
  const half = Math.floor(count / 2)
  const upper = select(finite, count, half)
  if (count % 2 === 1) return upper
  let lower = Number.NEGATIVE_INFINITY
  for (let i = 0; i < half; i++) lower = Math.max(lower, finite[i] ?? lower)
  return (lower + upper) / 2
}

// The value that would stand at this place in order; afterwards none before it is larger and none behind it smaller.
function select(values: Float64Array, count: number, place: number): number {
  let low = 0
  let high = count - 1
  while (low < high) {
    const pivot = values[place] ?? 0
    let i = low
    let j = high
    while (i <= j) {
      while ((values[i] ?? 0) < pivot) i++
      while ((values[j] ?? 0) > pivot) j--
      if (i > j) break
      const kept = values[i] ?? 0
      values[i++] = values[j] ?? 0
      values[j--] = kept
    }
    if (j < place) low = i
    if (i > place) high = j
  }
  return values[place] ?? Number.NaN
}
