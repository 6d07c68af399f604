/**
 * One computed number with its uncertainty in parts. Totals are derived from the parts, never stored alone: only so can an error that two
 * numbers share cancel in their ratio, be drawn once in a ranking and be shown apart from the scatter of the measurement.
 */
export interface Estimate {
  /** in the SI unit that the name of the field states */
  readonly value: number
  /** own, random part: one standard uncertainty, same unit as the value; null where it cannot be known (two points on a line, say) */
  readonly randomStandardUncertainty: number | null
  /** degrees of freedom of the random part; null stands for infinite (JSON has no infinity) */
  readonly degreesOfFreedom: number | null
  /** shared source id → change of the value, in the unit of the value and with its sign, for plus one standard uncertainty of that source */
  readonly sharedEffects: Readonly<Record<string, number>>
}

/** A named origin of error that several numbers share: this flow controller, this weighing, this calibration, this thermocouple. */
export interface SharedSource {
  /** for example `flow:<rig>`, `mass:<loading>`, `calibration:<id>:CH4`, `sites:<site count>`, `thermocouple:<rig>` */
  readonly id: string
  readonly kind:
    | 'flow'
    | 'mass'
    | 'response-factor'
    | 'site-count'
    | 'thermocouple'
    | 'pressure'
    | 'particle'
    | 'thermochemistry'
    | 'inlet'
  readonly label: string
  /** one standard uncertainty, relative unless `unit` says otherwise */
  readonly standardUncertainty: number
  /** `1` for a relative uncertainty, else the unit of the absolute one, such as `K` */
  readonly unit: string
}
