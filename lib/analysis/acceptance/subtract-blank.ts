import exp from '@stdlib/math-base-special-exp'
import ln from '@stdlib/math-base-special-ln'
import { AnalysisError } from '../analysis-error'

/** What an empty tube or a bed of diluent alone converts. */
export interface BlankPoint {
  readonly temperatureK: number
  /** key reactant consumed by the whole tube [mol s-1]; not above zero where nothing was seen */
  readonly consumptionMolPerS: number
  readonly standardUncertaintyMolPerS: number
}

/** Blank at a temperature of interest. */
export interface BlankAt {
  readonly consumptionMolPerS: number
  readonly standardUncertaintyMolPerS: number
  /** true outside the temperatures of the blank run, where the nearest point is taken */
  readonly isExtrapolated: boolean
}

/** A rate less its blank. */
export interface BlankCorrectedRate {
  /** may be negative: nothing is clipped [mol kg-1 s-1] */
  readonly rateMolPerKgS: number
  readonly standardUncertaintyMolPerKgS: number
  /** blank over gross rate */
  readonly blankShare: number
  readonly verdict: 'small' | 'noticeable' | 'too-large'
  readonly isExtrapolated: boolean
}

/** Shares of the signal from which a blank is pointed out and from which a rate is not trusted. Source: common practice. */
export const BLANK_SHARE = { noticeable: 0.05, tooLarge: 0.2 } as const

/**
 * Blank conversion at a temperature, from a blank run of the same rig, feed and flow.
 *
 * ln consumption straight in 1/T between neighbouring points; straight in T where one of them is not above zero
 *
 * Outside the measured temperatures the nearest point is taken and said to be. Assign blanks by rig, feed and flow before.
 * Source: common practice.
 *
 * @param points - at least 1 blank point: temperature [K] > 0, consumption [mol s-1], standard uncertainty [mol s-1] >= 0
 * @param temperatureK - where the blank is wanted [K]
 * @returns consumption with standard uncertainty [mol s-1]
 * @throws {AnalysisError} too-few-points without a point | not-finite | not-positive for a temperature not above zero
 */
export function blankAt(points: readonly BlankPoint[], temperatureK: number): BlankAt {
  if (points.some((point) => !(point.temperatureK > 0)) || !(temperatureK > 0))
    throw new AnalysisError('not-positive', 'Temperatures must be above zero.')
  if (
    ![temperatureK, ...points.flatMap((point) => [point.temperatureK, point.consumptionMolPerS])].every(Number.isFinite)
  )
    throw new AnalysisError('not-finite', 'Temperatures and consumptions of a blank must be finite numbers.')
  const sorted = points.toSorted((a, b) => a.temperatureK - b.temperatureK)
  const first = sorted[0]
  const last = sorted[sorted.length - 1]
  if (first === undefined || last === undefined)
    throw new AnalysisError('too-few-points', 'There is no blank to subtract.')
  if (temperatureK <= first.temperatureK) return atPoint(first, temperatureK < first.temperatureK)
  if (temperatureK >= last.temperatureK) return atPoint(last, temperatureK > last.temperatureK)
  const index = sorted.findIndex((point) => point.temperatureK >= temperatureK)
  const [before, after] = [sorted[index - 1] ?? first, sorted[index] ?? last]
  const isLogarithmic = before.consumptionMolPerS > 0 && after.consumptionMolPerS > 0
  const place = (t: number) => (isLogarithmic ? -1 / t : t)
  const share =
    (place(temperatureK) - place(before.temperatureK)) / (place(after.temperatureK) - place(before.temperatureK))
  const low = (1 - share) * before.standardUncertaintyMolPerS
  const high = share * after.standardUncertaintyMolPerS
  if (!isLogarithmic)
    return {
      consumptionMolPerS: (1 - share) * before.consumptionMolPerS + share * after.consumptionMolPerS,
      standardUncertaintyMolPerS: Math.sqrt(low * low + high * high),
      isExtrapolated: false,
    }
  const consumption = exp((1 - share) * ln(before.consumptionMolPerS) + share * ln(after.consumptionMolPerS))
  const relativeLow = low / before.consumptionMolPerS
  const relativeHigh = high / after.consumptionMolPerS
  return {
    consumptionMolPerS: consumption,
    standardUncertaintyMolPerS: consumption * Math.sqrt(relativeLow * relativeLow + relativeHigh * relativeHigh),
    isExtrapolated: false,
  }
}

/**
 * Rate of the catalyst alone: the blank's rate is subtracted, not its conversion.
 *
 * r = r_gross − n_blank/W; u² = u²(r_gross) + [u(n_blank)/W]²
 *
 * Differential conversions, where consumptions add. Negative results stay negative.
 * Source: common practice; JCGM 100:2008, equation 10.
 *
 * @param grossMolPerKgS - rate with the tube in it [mol kg-1 s-1]
 * @param grossStandardUncertainty - its standard uncertainty [mol kg-1 s-1]
 * @param catalystMassKg - catalyst [kg] > 0
 * @param blank - consumption at the same temperature [mol s-1]
 * @returns rate with standard uncertainty [mol kg-1 s-1] and the blank's share [-]
 * @throws {AnalysisError} not-positive for a mass not above zero
 */
export function subtractBlank(
  grossMolPerKgS: number,
  grossStandardUncertainty: number,
  catalystMassKg: number,
  blank: BlankAt,
): BlankCorrectedRate {
  if (!(catalystMassKg > 0) || !Number.isFinite(catalystMassKg))
    throw new AnalysisError('not-positive', 'The catalyst mass must be above zero.', { catalystMassKg })
  const blankRate = blank.consumptionMolPerS / catalystMassKg
  const blankUncertainty = blank.standardUncertaintyMolPerS / catalystMassKg
  const share = grossMolPerKgS > 0 ? Math.max(0, blankRate) / grossMolPerKgS : blankRate > 0 ? 1 : 0
  return {
    rateMolPerKgS: grossMolPerKgS - blankRate,
    standardUncertaintyMolPerKgS: Math.sqrt(
      grossStandardUncertainty * grossStandardUncertainty + blankUncertainty * blankUncertainty,
    ),
    blankShare: share,
    verdict: share > BLANK_SHARE.tooLarge ? 'too-large' : share > BLANK_SHARE.noticeable ? 'noticeable' : 'small',
    isExtrapolated: blank.isExtrapolated,
  }
}

function atPoint(point: BlankPoint, isExtrapolated: boolean): BlankAt {
  return {
    consumptionMolPerS: point.consumptionMolPerS,
    standardUncertaintyMolPerS: point.standardUncertaintyMolPerS,
    isExtrapolated,
  }
}
