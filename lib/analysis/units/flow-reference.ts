import { STANDARD_ATMOSPHERE_PA, ZERO_CELSIUS_K } from './constants'

/** State at which a "standard" or "normal" volume is counted. It turns a volume flow into an amount of gas, so it is part of the number. */
export interface FlowReference {
  readonly temperatureK: number
  readonly pressurePa: number
}

/** 0 °C and 101.325 kPa: the state meant by a "normal" volume (n). Source: DIN 1343:1990. */
export const NORMAL_REFERENCE: FlowReference = { temperatureK: ZERO_CELSIUS_K, pressurePa: STANDARD_ATMOSPHERE_PA }

/** A reference state in use, for a person to choose from. */
export interface NamedFlowReference extends FlowReference {
  readonly label: string
  readonly usedBy: string
}

/** Reference states in use. The same entered number differs by 10 % in amount between the first and the last. */
export const FLOW_REFERENCES: readonly NamedFlowReference[] = [
  {
    ...NORMAL_REFERENCE,
    label: '0 °C, 101.325 kPa',
    usedBy: 'DIN 1343 "normal"; semiconductor "standard"; IUPAC before 1982',
  },
  { temperatureK: 273.15, pressurePa: 100_000, label: '0 °C, 100 kPa', usedBy: 'IUPAC since 1982' },
  { temperatureK: 288.15, pressurePa: 101_325, label: '15 °C, 101.325 kPa', usedBy: 'ISO 13443 natural gas' },
  {
    temperatureK: 293.15,
    pressurePa: 101_325,
    label: '20 °C, 101.325 kPa',
    usedBy: 'many meters outside the semiconductor trade',
  },
  {
    // 70 °F and 14.696 psi, as the trade states them
    temperatureK: ((70 + 459.67) * 5) / 9,
    pressurePa: 101_325,
    label: '70 °F, 14.696 psi',
    usedBy: 'compressed-gas trade in the United States',
  },
  { temperatureK: 298.15, pressurePa: 101_325, label: '25 °C, 101.325 kPa', usedBy: 'ambient practice' },
  { temperatureK: 298.15, pressurePa: 100_000, label: '25 °C, 100 kPa', usedBy: 'ambient practice' },
]
