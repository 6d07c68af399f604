/** Surrounding pressure assumed when none was read [Pa]; its standard uncertainty covers weather and altitude of most sites. */
export const DEFAULT_BAROMETER_PA = 101_325
/** Standard uncertainty of the assumed surrounding pressure [Pa]. */
export const DEFAULT_BAROMETER_STANDARD_UNCERTAINTY_PA = 2_000

/**
 * Absolute pressure behind a gauge reading.
 *
 * p = p_gauge + p_barometer
 *
 * Source: definition of gauge pressure.
 *
 * @param gaugePa - gauge reading [Pa]
 * @param barometerPa - pressure the gauge is open to [Pa] > 0
 * @returns absolute pressure [Pa]; a result at or below zero means the reading or the kind is wrong, and is given as it is
 */
export function absolutePressure(gaugePa: number, barometerPa: number): number {
  return gaugePa + barometerPa
}
