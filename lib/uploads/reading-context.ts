/** What is known outside the file: the rig it comes from and the species the campaign analyses. */
export interface ReadingContext {
  /** IANA zone of the rig's clocks; empty when nobody has said */
  readonly rigTimeZone: string
  /** pressure that the rig's gauges are open to; null when nobody has said */
  readonly barometerPa: number | null
  /** species by formula, as reaction and calibrations name them */
  readonly species: readonly string[]
  /** reference state of the rig's flow controllers, proposed where a file states none */
  readonly flowReference?: { readonly temperatureK: number; readonly pressurePa: number } | null
}
