import { AnalysisError } from '../analysis-error'
import { GAS_CONSTANT_J_PER_MOL_K } from './constants'
import { type FlowReference } from './flow-reference'

/**
 * Amount of gas per time behind a volume flow counted at a stated reference state.
 *
 * F = p_ref V_ref / (R T_ref)
 *
 * A reference volume is an amount by definition, so the ideal-gas law is exact here whatever the gas. For an actual volume flow pass the
 * actual temperature and pressure; then Z = 1 is assumed, which is good below about 20 bar and away from condensation.
 * Source: ISO 13443:1996, clause 3; CODATA 2018 gas constant (exact).
 *
 * @param volumeFlowM3PerS - volume flow at the reference state [m3 s-1], any sign
 * @param reference - temperature [K] > 0 and absolute pressure [Pa] > 0 at which the volume is counted
 * @returns molar flow [mol s-1]
 * @throws {AnalysisError} not-positive when a temperature or pressure is not above zero
 * @example 1 cm3 min-1 at 0 °C and 101.325 kPa is 0.743583890 µmol s-1
 */
export function molarFlowFromVolumeFlow(volumeFlowM3PerS: number, reference: FlowReference): number {
  requireReference(reference)
  return (reference.pressurePa * volumeFlowM3PerS) / (GAS_CONSTANT_J_PER_MOL_K * reference.temperatureK)
}

/**
 * Volume flow, counted at a stated reference state, behind an amount of gas per time.
 *
 * V_ref = F R T_ref / p_ref
 *
 * Source: as {@link molarFlowFromVolumeFlow}, of which it is the inverse.
 *
 * @param molarFlowMolPerS - molar flow [mol s-1], any sign
 * @param reference - temperature [K] > 0 and absolute pressure [Pa] > 0 at which the volume is counted
 * @returns volume flow [m3 s-1]
 * @throws {AnalysisError} not-positive when a temperature or pressure is not above zero
 */
export function volumeFlowFromMolarFlow(molarFlowMolPerS: number, reference: FlowReference): number {
  requireReference(reference)
  return (molarFlowMolPerS * GAS_CONSTANT_J_PER_MOL_K * reference.temperatureK) / reference.pressurePa
}

function requireReference(reference: FlowReference): void {
  if (!(reference.temperatureK > 0) || !(reference.pressurePa > 0))
    throw new AnalysisError(
      'not-positive',
      'A reference state needs a temperature and an absolute pressure above zero.',
      {
        ...reference,
      },
    )
}
