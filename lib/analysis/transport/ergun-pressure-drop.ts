import { AnalysisError } from '../analysis-error'

/** A packed bed and the gas through it. */
export interface BedFlow {
  readonly particleDiameterM: number
  readonly bedVoidFraction: number
  readonly superficialVelocityMPerS: number
  readonly densityKgPerM3: number
  readonly viscosityPaS: number
  readonly bedLengthM: number
}

/**
 * Pressure drop over a packed bed.
 *
 * ΔP/L = 150 μ (1−ε)² u / (ε³ d_p²) + 1.75 (1−ε) ρ u² / (ε³ d_p)
 *
 * Spheres of one size, 1 < Re/(1−ε) < 2300; reads high above 700.
 * Source: Ergun, Chem. Eng. Prog. 48 (2) (1952) 89.
 *
 * @param bed - particle diameter [m] > 0, void fraction [-] between 0 and 1, superficial velocity [m s-1], density [kg m-3], viscosity [Pa s], length [m]
 * @returns pressure drop [Pa]
 * @throws {AnalysisError} not-finite | not-positive when the diameter is not above zero | out-of-range when the void fraction is not between 0 and 1
 * @example 0.8 mm, 0.4, 1 mm/s, water, 1 m: 1338.8671875 Pa
 */
export function ergunPressureDrop(bed: BedFlow): number {
  const { particleDiameterM: d, bedVoidFraction: void_, superficialVelocityMPerS: u } = bed
  if (Object.values(bed).some((value) => !Number.isFinite(value)))
    throw new AnalysisError('not-finite', 'Every number of the bed must be finite.', { ...bed })
  if (!(d > 0))
    throw new AnalysisError('not-positive', 'The particle diameter must be above zero.', { particleDiameterM: d })
  if (!(void_ > 0 && void_ < 1))
    throw new AnalysisError('out-of-range', 'The void fraction lies between 0 and 1.', { bedVoidFraction: void_ })
  const solid = 1 - void_
  const cube = void_ * void_ * void_
  const viscous = (150 * bed.viscosityPaS * solid * solid * u) / (cube * d * d)
  const inertial = (1.75 * solid * bed.densityKgPerM3 * u * u) / (cube * d)
  return (viscous + inertial) * bed.bedLengthM
}
