/** Size of a file in words: `312 kB`, `9.8 MB`. */
export function sizeText(bytes: number): string {
  if (bytes < 1_000) return `${bytes} bytes`
  if (bytes < 1_000_000) return `${Math.round(bytes / 1_000)} kB`
  return `${(bytes / 1_000_000).toFixed(1)} MB`
}
