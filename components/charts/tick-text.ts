/** A tick's number with no more figures than it needs, and a true minus. */
export function tickText(value: number): string {
  return String(Number(value.toPrecision(6))).replace('-', '−')
}
