import { type Caution } from '../caution'
import { raiseCaution } from '../cautions'
import { hasThermochemistry } from '../equilibrium/thermochemistry'
import { reactionEnthalpy } from '../equilibrium/approach-to-equilibrium'
import { totalUncertainty } from '../total-uncertainty'
import { regimeOfPoint } from '../transport/regime-of-point'
import { type GasAnalysis } from './gas-analysis'
import { type HoldConversion } from './conversion'
import { type RunInput } from './run-input'
import { type Point } from './run-reduction'

const NEAR_EQUILIBRIUM = 0.05
export const AT_EQUILIBRIUM = 0.8
const ROUTES_APART = 2
const WANTED_INJECTIONS = 3
const ENERGY_FOR_CRITERIA_J_PER_MOL = 80_000

// Diffusion inside the particle, judged where the particle is described.
function poreCaution(input: RunInput, point: Omit<Point, 'workings' | 'cautions'>): Caution[] {
  const step = input.reaction.steps[0]
  const rate = point.meanRateMolPerKgS
  if (step === undefined || rate === null || !(rate.value > 0) || input.loading.particleDiameterM === null) return []
  const entered = input.reaction.thermochemistry ?? {}
  const isKnown = Object.keys(step).every((species) => hasThermochemistry(species, entered))
  const report = regimeOfPoint({
    holdNumber: point.hold.number,
    temperatureK: point.temperatureK.value,
    pressurePa: point.meanPressurePa,
    totalFlowMolPerS: point.totalFlowMolPerS,
    inletMoleFraction: point.inletMoleFraction,
    keyReactant: input.reaction.keyReactant,
    stoichiometry: step,
    conversion: point.conversion?.value ?? 0,
    rateMolPerKgS: rate.value,
    rateRelativeStandardUncertainty: (totalUncertainty(rate)?.standardUncertainty ?? 0) / rate.value,
    orderInKeyReactant: input.method.rateOrders[0]?.[input.reaction.keyReactant] ?? null,
    activationEnergyJPerMol: ENERGY_FOR_CRITERIA_J_PER_MOL,
    reactionEnthalpyJPerMol: isKnown ? reactionEnthalpy(step, point.temperatureK.value, entered) : null,
    loading: input.loading,
  })
  const pore = report.criteria.find((criterion) => criterion.id === 'pore-diffusion')
  if (pore === undefined || pore.verdict !== 'fail' || pore.value === null) return []
  const assumed = pore.assumed.map((entry) => entry.name)
  return [
    raiseCaution('pore-diffusion-likely', {
      value: pore.value,
      limit: pore.limit,
      holdNumber: point.hold.number,
      more: { assumed: assumed.length === 0 ? '' : ` Assumed: ${assumed.join(', ')}.` },
    }),
  ]
}

/**
 * Every doubt about one point.
 *
 * Source: the thresholds stand in the catalogue of cautions with their sources.
 *
 * @param input - of the run [SI]
 * @param analysis - which peak serves for what [-]
 * @param conversion - of the hold [-]
 * @param point - the point so far [SI]
 * @returns its cautions, in the order of the catalogue [-]
 */
export function pointCautions(
  input: RunInput,
  analysis: GasAnalysis,
  conversion: HoldConversion,
  point: Omit<Point, 'workings' | 'cautions'>,
): Caution[] {
  const { method } = input
  const holdNumber = point.hold.number
  const cautions: Caution[] = []
  const balance = point.carbonBalance
  if (balance !== null) {
    const u = totalUncertainty(balance)?.standardUncertainty ?? 0
    if (Math.abs(balance.value - 1) > Math.max(method.carbonBalanceWindow, 2 * u))
      cautions.push(
        raiseCaution('hold-carbon-balance', { value: balance.value, limit: method.carbonBalanceWindow, holdNumber }),
      )
  }
  const { answer, driftPerH, lowPerH, highPerH } = point.steadyState
  if (answer === 'drifting')
    cautions.push(raiseCaution('drifting', { value: driftPerH, limit: method.steadyLimitPerH, holdNumber }))
  else if (answer === 'cannot-tell' && lowPerH !== null && highPerH !== null)
    cautions.push(
      raiseCaution('steady-state-unknown', {
        value: driftPerH,
        limit: method.steadyLimitPerH,
        holdNumber,
        more: { low: lowPerH, high: highPerH },
      }),
    )
  const X = point.conversion
  if (X !== null && X.value > method.maximumConversion)
    cautions.push(raiseCaution('conversion-high', { value: X.value, limit: method.maximumConversion, holdNumber }))
  const eta = point.approachToEquilibrium
  if (eta !== null && eta > AT_EQUILIBRIUM)
    cautions.push(raiseCaution('at-equilibrium', { value: eta, limit: AT_EQUILIBRIUM, holdNumber }))
  else if (eta !== null && eta > NEAR_EQUILIBRIUM)
    cautions.push(raiseCaution('near-equilibrium', { value: eta, limit: NEAR_EQUILIBRIUM, holdNumber }))
  const z = point.routeConsistencyZ
  if (z !== null && Math.abs(z) > ROUTES_APART)
    cautions.push(
      raiseCaution('routes-disagree', {
        value: z,
        limit: ROUTES_APART,
        holdNumber,
        more: {
          reactant: point.conversionByReactant?.value ?? Number.NaN,
          products: point.conversionByProducts?.value ?? Number.NaN,
        },
      }),
    )
  for (const product of analysis.products) {
    const missed = conversion.means.count - (conversion.means.seen[product.species] ?? 0)
    if (missed > 0)
      cautions.push(
        raiseCaution('below-detection', {
          value: missed,
          limit: null,
          holdNumber,
          more: { species: product.species, count: String(conversion.means.count) },
        }),
      )
  }
  if (point.injectionsUsed.length > 0 && point.injectionsUsed.length < WANTED_INJECTIONS)
    cautions.push(
      raiseCaution('few-injections', { value: point.injectionsUsed.length, limit: WANTED_INJECTIONS, holdNumber }),
    )
  if (input.kind === 'catalyst') cautions.push(...poreCaution(input, point))
  return cautions
}
