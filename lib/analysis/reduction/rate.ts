import { AnalysisError } from '../analysis-error'
import { approachToEquilibrium, lnEquilibriumConstant } from '../equilibrium/approach-to-equilibrium'
import { hasThermochemistry } from '../equilibrium/thermochemistry'
import { type Estimate } from '../estimate'
import { type BedStep, solvePlugFlowBed } from './plug-flow-bed'
import { type ReactionInput, type ReductionMethod, type Species } from './run-input'

export interface RateRequest {
  readonly reaction: ReactionInput
  readonly method: ReductionMethod
  readonly temperatureK: number
  readonly pressurePa: number
  readonly inletMoleFraction: Readonly<Record<Species, number>>
  readonly keyFlowMolPerS: Estimate
  readonly catalystMassKg: number
  readonly massSourceId: string
  readonly massRelativeStandardUncertainty: number
  readonly conversion: Estimate
  readonly stepConversions: readonly number[]
}

export interface RateResult {
  /** F_A0 X / W, mean over the bed */
  readonly meanRate: Estimate
  /** forward rate at feed composition; null where no rate gives this conversion */
  readonly rate: Estimate | null
  /** Q/K of the main step at the outlet; null without thermochemistry */
  readonly approach: number | null
  /** forward rate over mean rate */
  readonly correction: number | null
  /** relative change of the forward rate for a relative change of the conversion */
  readonly sensitivity: number
  /** why there is no rate, in words */
  readonly reason: string
  readonly isEquilibriumKnown: boolean
}

// Partial pressures at given conversions by each step, mole number followed.
function pressuresAt(request: RateRequest, share: number): Record<Species, number> {
  const { reaction, inletMoleFraction, pressurePa } = request
  const keyFraction = inletMoleFraction[reaction.keyReactant] ?? 0
  const flows: Record<Species, number> = { ...inletMoleFraction }
  reaction.steps.forEach((step, s) => {
    const consumed = -(step[reaction.keyReactant] ?? -1)
    const extent = (keyFraction * share * (request.stepConversions[s] ?? 0)) / consumed
    for (const species of Object.keys(step).sort())
      flows[species] = (flows[species] ?? 0) + extent * (step[species] ?? 0)
  })
  let total = 0
  for (const species of Object.keys(flows).sort()) total += flows[species] ?? 0
  const pressures: Record<Species, number> = {}
  for (const species of Object.keys(flows).sort()) pressures[species] = (pressurePa * (flows[species] ?? 0)) / total
  return pressures
}

function relativeEffects(conversion: Estimate, sensitivity: number): Record<string, number> {
  const effects: Record<string, number> = {}
  if (conversion.value === 0) return effects
  for (const [id, effect] of Object.entries(conversion.sharedEffects))
    effects[id] = (effect / conversion.value) * sensitivity
  return effects
}

function assemble(request: RateRequest, value: number, sensitivity: number): Estimate {
  const { conversion, keyFlowMolPerS } = request
  const relative = relativeEffects(conversion, sensitivity)
  for (const [id, effect] of Object.entries(keyFlowMolPerS.sharedEffects)) {
    relative[id] = (relative[id] ?? 0) + effect / keyFlowMolPerS.value
  }
  relative[request.massSourceId] = (relative[request.massSourceId] ?? 0) - request.massRelativeStandardUncertainty
  const sharedEffects: Record<string, number> = {}
  for (const id of Object.keys(relative).sort()) sharedEffects[id] = (relative[id] ?? 0) * value
  const random = conversion.randomStandardUncertainty
  return {
    value,
    randomStandardUncertainty:
      random === null || conversion.value === 0 ? random : Math.abs((random / conversion.value) * sensitivity * value),
    degreesOfFreedom: conversion.degreesOfFreedom,
    sharedEffects,
  }
}

function bedFactor(request: RateRequest, steps: readonly BedStep[], scale: number): number {
  return solvePlugFlowBed({
    keyReactant: request.reaction.keyReactant,
    inletMoleFraction: request.inletMoleFraction,
    pressurePa: request.pressurePa,
    steps: steps.map((step) => ({ ...step, conversion: step.conversion * scale })),
  }).total
}

/**
 * Rate of consumption of the key reactant per mass of catalyst, mean over the bed and forward at feed composition.
 *
 * Mean: r = F_A0 X / W. Differential law: forward rate = mean rate / (1 - eta) at the mean composition. Integral law: the plug-flow bed is solved
 * with the method's orders for the forward rate at the inlet (`solvePlugFlowBed`). The uncertainty follows that of the conversion by the numerical
 * derivative of the law; flow and mass enter as shared relative errors.
 * Source: O. Levenspiel, Chemical Reaction Engineering, 3rd edition, 1999, chapters 5 and 18.
 *
 * @param request - conditions [K; Pa; mol s-1; kg], conversion and its split over the steps [-]
 * @returns both rates in parts, approach to equilibrium at the outlet [mol kg-1 s-1; -]
 * @throws {AnalysisError} missing-input
 */
export function rateOfHold(request: RateRequest): RateResult {
  const { reaction, method, temperatureK, conversion } = request
  const mean = (request.keyFlowMolPerS.value * conversion.value) / request.catalystMassKg
  const meanRate = assemble(request, mean, 1)
  const entered = reaction.thermochemistry ?? {}
  const lnK = reaction.steps.map((step) =>
    Object.keys(step).every((species) => hasThermochemistry(species, entered))
      ? lnEquilibriumConstant(step, temperatureK, entered)
      : null,
  )
  const isEquilibriumKnown = lnK.every((value) => value !== null)
  const mainStep = reaction.steps[0]
  const mainLnK = lnK[0] ?? null
  const etaAt = (share: number): number | null =>
    mainStep === undefined || mainLnK === null
      ? null
      : approachToEquilibrium(mainStep, pressuresAt(request, share), mainLnK)
  const approach = conversion.value > 0 ? etaAt(1) : 0
  const nothing = { meanRate, rate: null, approach, correction: null, sensitivity: 1, isEquilibriumKnown }
  if (!(conversion.value > 0)) return { ...nothing, reason: 'the conversion is not above zero' }
  if (method.rateLaw === 'differential') {
    const eta = method.correctForEquilibrium ? (etaAt(0.5) ?? 0) : 0
    if (!(eta < 1)) return { ...nothing, reason: 'the gas is at or beyond equilibrium' }
    const correction = 1 / (1 - eta)
    return {
      meanRate,
      rate: assemble(request, mean * correction, 1),
      approach,
      correction,
      sensitivity: 1,
      reason: '',
      isEquilibriumKnown,
    }
  }
  const negative = request.stepConversions.some((value) => value < 0)
  const steps = reaction.steps.map((stoichiometry, s): BedStep => ({
    stoichiometry,
    orders: method.rateOrders[s] ?? {},
    // a minor step that noise takes below zero is given to the main one: the sum stays what was measured
    conversion: negative ? (s === 0 ? conversion.value : 0) : (request.stepConversions[s] ?? 0),
    lnEquilibrium: method.correctForEquilibrium ? (lnK[s] ?? null) : null,
  }))
  try {
    const total = bedFactor(request, steps, 1)
    const nudge = 1e-3
    const up = bedFactor(request, steps, 1 + nudge)
    const sensitivity = (up / total - 1) / nudge
    const value = (total * request.keyFlowMolPerS.value) / request.catalystMassKg
    return {
      meanRate,
      rate: assemble(request, value, sensitivity),
      approach,
      correction: value / mean,
      sensitivity,
      reason: '',
      isEquilibriumKnown,
    }
  } catch (error) {
    if (error instanceof AnalysisError && (error.code === 'no-convergence' || error.code === 'out-of-range')) {
      return { ...nothing, reason: 'no forward rate gives this conversion: the gas is at or beyond equilibrium' }
    }
    throw error
  }
}
