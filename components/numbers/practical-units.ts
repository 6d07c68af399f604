import ln from '@stdlib/math-base-special-ln'

/** SI inside, practical units on screen; each with the header it is shown under. Factors are exact. */
export interface PracticalUnit {
  readonly label: string
  readonly fromSi: (valueSi: number) => number
  /** an uncertainty or a difference has no zero point */
  readonly differenceFromSi: (differenceSi: number) => number
}

const scaled = (label: string, factor: number): PracticalUnit => ({
  label,
  fromSi: (valueSi) => valueSi * factor,
  differenceFromSi: (differenceSi) => differenceSi * factor,
})

/** mol kg⁻¹ s⁻¹ to µmol g⁻¹ s⁻¹ */
const RATE_FACTOR = 1_000

export const practicalUnits = {
  activationEnergy: scaled('kJ mol⁻¹', 1e-3),
  rate: scaled('µmol g⁻¹ s⁻¹', RATE_FACTOR),
  turnoverFrequency: scaled('10⁻³ s⁻¹', 1e3),
  percent: scaled('%', 100),
  percentPerHour: scaled('% h⁻¹', 100),
  carbonPercent: scaled('C-mol %', 100),
  /** carbon out over carbon in */
  carbonBalance: scaled('out/in', 1),
  hours: scaled('h', 1 / 3_600),
  ratio: scaled('', 1),
  temperature: {
    label: '°C',
    fromSi: (valueSi: number) => valueSi - 273.15,
    differenceFromSi: (differenceSi: number) => differenceSi,
  },
  /** ln of a rate in the plot's unit: a shift, so its uncertainty is untouched */
  lnRate: {
    label: 'µmol g⁻¹ s⁻¹',
    fromSi: (valueSi: number) => valueSi + ln(RATE_FACTOR),
    differenceFromSi: (differenceSi: number) => differenceSi,
  },
  /** ln A is given for A in SI, as its working has it */
  lnPreExponential: scaled('A in mol kg⁻¹ s⁻¹', 1),
} satisfies Record<string, PracticalUnit>
