/** Sieve number and opening in micrometres. Source: ASTM E11-22, table 1. */
const OPENING_UM: Readonly<Record<number, number>> = {
  4: 4_750,
  5: 4_000,
  6: 3_350,
  7: 2_800,
  8: 2_360,
  10: 2_000,
  12: 1_700,
  14: 1_400,
  16: 1_180,
  18: 1_000,
  20: 850,
  25: 710,
  30: 600,
  35: 500,
  40: 425,
  45: 355,
  50: 300,
  60: 250,
  70: 212,
  80: 180,
  100: 150,
  120: 125,
  140: 106,
  170: 90,
  200: 75,
  230: 63,
  270: 53,
  325: 45,
  400: 38,
  450: 32,
  500: 25,
  635: 20,
}

/**
 * Opening of a sieve given by its number.
 *
 * A larger number is a finer sieve. Other series (Tyler) differ for some numbers.
 * Source: ASTM E11-22, table 1.
 *
 * @param mesh - sieve number [-]
 * @returns opening [m]; null for a number that is not in the series
 * @example 80 mesh is 180 µm
 */
export function meshOpeningM(mesh: number): number | null {
  const opening = Object.hasOwn(OPENING_UM, mesh) ? OPENING_UM[mesh] : undefined
  return opening === undefined ? null : opening / 1_000_000
}
