const STEPS = ['bytes', 'kB', 'MB', 'GB'] as const

/** Size of a file in words: `1 byte`, `812 bytes`, `184 kB`, `2.4 GB`; thousands, as disks are sold. */
export function fileSize(byteCount: number): string {
  if (byteCount === 1) return '1 byte'
  let step = 0
  let value = byteCount
  // 999.5 kB would be written as 1000 kB: it is a megabyte
  while (value >= 999.5 && step < STEPS.length - 1) {
    value /= 1_000
    step++
  }
  const text = step === 0 || value >= 99.95 ? value.toFixed(0) : Number(value.toPrecision(3)).toString()
  return `${text} ${STEPS[step] ?? ''}`
}
