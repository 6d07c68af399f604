/** The next code of a series on labels: after `R-0041` comes `R-0042`, after `R-9999` `R-10000`. */
export function codeAfter(letter: 'R' | 'L', largest: number): string {
  return `${letter}-${String(largest + 1).padStart(4, '0')}`
}
