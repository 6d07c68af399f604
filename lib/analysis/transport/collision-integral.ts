import exp from '@stdlib/math-base-special-exp'
import pow from '@stdlib/math-base-special-pow'

/**
 * Collision integral for diffusion of Lennard-Jones molecules.
 *
 * Ω_D = 1.06036/T*^0.1561 + 0.193/e^(0.47635 T*) + 1.03587/e^(1.52996 T*) + 1.76474/e^(3.89411 T*)
 *
 * 0.3 ≤ T* ≤ 100.
 * Source: Neufeld, Janzen and Aziz, J. Chem. Phys. 57 (1972) 1100.
 *
 * @param reducedTemperature - T* = k T / ε [-] > 0
 * @returns collision integral [-]
 * @example 1.283 gives 1.282 (printed in Benítez, example 1.6)
 */
export function diffusionCollisionIntegral(reducedTemperature: number): number {
  return (
    1.06036 / pow(reducedTemperature, 0.1561) +
    0.193 * exp(-0.47635 * reducedTemperature) +
    1.03587 * exp(-1.52996 * reducedTemperature) +
    1.76474 * exp(-3.89411 * reducedTemperature)
  )
}

/**
 * Collision integral for viscosity of Lennard-Jones molecules.
 *
 * Ω_v = 1.16145/T*^0.14874 + 0.52487/e^(0.7732 T*) + 2.16178/e^(2.43787 T*)
 *
 * 0.3 ≤ T* ≤ 100.
 * Source: Neufeld, Janzen and Aziz, J. Chem. Phys. 57 (1972) 1100.
 *
 * @param reducedTemperature - T* = k T / ε [-] > 0
 * @returns collision integral [-]
 */
export function viscosityCollisionIntegral(reducedTemperature: number): number {
  return (
    1.16145 / pow(reducedTemperature, 0.14874) +
    0.52487 * exp(-0.7732 * reducedTemperature) +
    2.16178 * exp(-2.43787 * reducedTemperature)
  )
}
