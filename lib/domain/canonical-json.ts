/**
 * One text for one value: keys sorted, no white space, numbers as the shortest text that reads back to the same double. What is hashed
 * is this text, never the bytes of a workbook or of a database column. NaN and infinities have no place in it and are refused.
 */
export function canonicalJson(value: unknown): string {
  if (value === null || typeof value === 'boolean' || typeof value === 'string') return JSON.stringify(value)
  if (typeof value === 'number') {
    if (!Number.isFinite(value)) throw new TypeError(`canonical JSON cannot hold ${value}`)
    return JSON.stringify(value)
  }
  if (Array.isArray(value))
    return `[${value.map((entry) => canonicalJson(entry === undefined ? null : entry)).join(',')}]`
  if (typeof value === 'object') {
    const entries = Object.entries(value)
      .filter(([, entry]) => entry !== undefined)
      .sort(([a], [b]) => (a < b ? -1 : a > b ? 1 : 0))
    return `{${entries.map(([key, entry]) => `${JSON.stringify(key)}:${canonicalJson(entry)}`).join(',')}}`
  }
  throw new TypeError(`canonical JSON cannot hold a ${typeof value}`)
}
