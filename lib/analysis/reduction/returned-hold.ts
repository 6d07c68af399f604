import exp from '@stdlib/math-base-special-exp'
import ln from '@stdlib/math-base-special-ln'
import { type Caution } from '../caution'
import { raiseCaution } from '../cautions'
import { type Estimate } from '../estimate'
import { propagate } from '../propagate'
import { totalUncertainty } from '../total-uncertainty'
import { GAS_CONSTANT_J_PER_MOL_K } from '../units/constants'
import { type Point, type RunReduction } from './run-reduction'

const SECONDS_PER_HOUR = 3_600
/** Beyond this change of the returned hold the line says little about the fresh catalyst. */
const GRAVE_CHANGE = 0.2

/**
 * What a hold that returns to earlier conditions says about the time between.
 *
 * ratio = r_returned / r_first, brought to the same temperature by exp[(E_a / R)(1/T_returned − 1/T_first)]; loss = −ln(ratio) / Δt for a first-order
 * loss of activity. Shared errors cancel in the ratio. The last return of the run is taken: it spans the longest time.
 * Source: O. Levenspiel, Chemical Reaction Engineering, 3rd edition, 1999, chapter 21 (first-order loss); bracketing: common practice.
 *
 * @param points - of the run, in time order [SI]
 * @param activationEnergyJPerMol - of the run's line; null where there is none, then no correction for the small difference of temperature [J mol-1]
 * @returns ratio with its uncertainty [-] and loss [h-1]; null where no hold returns
 */
export function judgeReturnedHold(
  points: readonly Point[],
  activationEnergyJPerMol: number | null,
): RunReduction['returnedHold'] {
  let found: RunReduction['returnedHold'] = null
  for (const point of points) {
    const first = points.find((candidate) => candidate.hold.number === point.hold.returnsTo)
    const later = point.rateMolPerKgS
    const earlier = first?.rateMolPerKgS ?? null
    if (first === undefined || later === null || earlier === null || !(later.value > 0) || !(earlier.value > 0))
      continue
    const shift =
      activationEnergyJPerMol === null
        ? 0
        : (activationEnergyJPerMol / GAS_CONSTANT_J_PER_MOL_K) *
          (1 / point.temperatureK.value - 1 / first.temperatureK.value)
    const ratio = (later.value / earlier.value) * exp(shift)
    const own = [later, earlier].map((rate) =>
      rate.randomStandardUncertainty === null ? null : rate.randomStandardUncertainty / rate.value,
    )
    const [a, b] = [own[0] ?? null, own[1] ?? null]
    const hours = (point.timeOnStreamS - first.timeOnStreamS) / SECONDS_PER_HOUR
    if (!(hours > 0)) continue
    found = {
      holdNumber: point.hold.number,
      returnsTo: first.hold.number,
      ratio: {
        value: ratio,
        randomStandardUncertainty: a === null || b === null ? null : ratio * Math.sqrt(a * a + b * b),
        degreesOfFreedom: later.degreesOfFreedom,
        sharedEffects: {},
      },
      lossPerH: -ln(ratio) / hours,
    }
  }
  return found
}

/**
 * Loss of activity on stream that a returned hold shows, with its uncertainty in parts.
 *
 * k_d = -ln(ratio) / t; u^2(ln ratio) = u_r^2(r_returned) + u_r^2(r_first) + (E_a / R)^2 [u^2(T_returned) / T_returned^4 + u^2(T_first) / T_first^4] and
 * (1/T_returned - 1/T_first)^2 u^2(E_a) / R^2, own parts alone; of a shared source what moves the two rates apart is left. A first-order loss between
 * two states is assumed: how the loss went between them is not seen. The time between is taken as exact. Below zero the bed became more active.
 * Source: O. Levenspiel, Chemical Reaction Engineering, 3rd edition, 1999, chapter 21 (first-order loss); JCGM 100:2008, 5.1.2 and 5.2.2.
 *
 * @param points - of the run [SI]
 * @param returned - which hold returns to which, and their ratio [-]
 * @param activationEnergy - of the run's line; null where there is none, then nothing is corrected for the small difference of temperature [J mol-1]
 * @returns loss in parts, degrees of freedom by Welch and Satterthwaite, and the time it rests on [h-1; h]; null where one of the two holds is missing
 */
export function lossOfReturnedHold(
  points: readonly Point[],
  returned: NonNullable<RunReduction['returnedHold']>,
  activationEnergy: Estimate | null,
): { readonly lossPerH: Estimate; readonly hours: number } | null {
  const later = points.find((point) => point.hold.number === returned.holdNumber)
  const earlier = points.find((point) => point.hold.number === returned.returnsTo)
  const rateLater = later?.rateMolPerKgS ?? null
  const rateEarlier = earlier?.rateMolPerKgS ?? null
  if (later === undefined || earlier === undefined || rateLater === null || rateEarlier === null) return null
  const hours = (later.timeOnStreamS - earlier.timeOnStreamS) / SECONDS_PER_HOUR
  if (!(hours > 0) || !(returned.ratio.value > 0)) return null
  const slope = (activationEnergy?.value ?? 0) / GAS_CONSTANT_J_PER_MOL_K
  const [x, xFirst] = [1 / later.temperatureK.value, 1 / earlier.temperatureK.value]
  const energyShare = activationEnergy === null ? [] : [activationEnergy]
  return {
    lossPerH: propagate(-ln(returned.ratio.value) / hours, [
      [
        { estimate: rateLater, sensitivity: -1 / (rateLater.value * hours) },
        { estimate: rateEarlier, sensitivity: 1 / (rateEarlier.value * hours) },
      ],
      [
        { estimate: later.temperatureK, sensitivity: (slope * x * x) / hours },
        { estimate: earlier.temperatureK, sensitivity: -(slope * xFirst * xFirst) / hours },
      ],
      // what all points of the line share is in their rates already
      energyShare.map((estimate) => ({
        estimate: { ...estimate, sharedEffects: {} },
        sensitivity: -(x - xFirst) / (GAS_CONSTANT_J_PER_MOL_K * hours),
      })),
    ]),
    hours,
  }
}

/**
 * The caution that goes with a returned hold, where it is off by more than its limit and more than twice its uncertainty.
 *
 * @param returned - what the returned hold says [-]
 * @param temperatureK - of the returned hold [K]
 * @param limit - relative change that is still unchanged [-]
 * @param correctedEnergyJPerMol - activation energy with the loss taken out; null where it could not be fitted [J mol-1]
 * @returns none or one caution [-]
 */
export function returnedHoldCautions(
  returned: NonNullable<RunReduction['returnedHold']>,
  temperatureK: number,
  limit: number,
  correctedEnergyJPerMol: number | null,
): Caution[] {
  const change = Math.abs(1 - returned.ratio.value)
  const u = totalUncertainty(returned.ratio)?.standardUncertainty ?? 0
  if (!(change > Math.max(limit, 2 * u))) return []
  const corrected =
    correctedEnergyJPerMol === null
      ? ''
      : ` With a steady loss of that size taken out, the activation energy would be ${(correctedEnergyJPerMol / 1000).toFixed(1)} kJ/mol.`
  return [
    raiseCaution(change > GRAVE_CHANGE ? 'strong-deactivation' : 'deactivation', {
      value: returned.ratio.value,
      limit: change > GRAVE_CHANGE ? GRAVE_CHANGE : limit,
      more: { temperatureK, lossPerH: returned.lossPerH, corrected },
    }),
  ]
}

/**
 * A rate brought back to the activity at the start, for a first-order loss.
 *
 * r_0 = r exp(loss · t)
 * Source: O. Levenspiel, Chemical Reaction Engineering, 3rd edition, 1999, chapter 21.
 *
 * @param rate - as measured [mol kg-1 s-1]
 * @param timeOnStreamS - since the start [s]
 * @param lossPerH - first-order loss [h-1]
 * @returns the rate at the start; parts grow with it [mol kg-1 s-1]
 */
export function withoutLoss(rate: Estimate, timeOnStreamS: number, lossPerH: number): Estimate {
  const factor = exp((lossPerH * timeOnStreamS) / SECONDS_PER_HOUR)
  const sharedEffects: Record<string, number> = {}
  for (const id of Object.keys(rate.sharedEffects).sort()) sharedEffects[id] = (rate.sharedEffects[id] ?? 0) * factor
  return {
    value: rate.value * factor,
    randomStandardUncertainty: rate.randomStandardUncertainty === null ? null : rate.randomStandardUncertainty * factor,
    degreesOfFreedom: rate.degreesOfFreedom,
    sharedEffects,
  }
}
