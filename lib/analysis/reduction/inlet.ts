import { type Caution } from '../caution'
import { raiseCaution } from '../cautions'
import { type Inlet } from './conversion'
import { areaRatio, type GasAnalysis, meanRatios } from './gas-analysis'
import { type InjectionTable, type ReductionMethod, type Species } from './run-input'

export interface MeasuredInlet {
  readonly inlet: Inlet
  readonly cautions: readonly Caution[]
}

/** Feed analysis may change by this much over the bypass injections. */
const BYPASS_DRIFT_LIMIT = 0.02

function driftOf(injections: InjectionTable, analysis: GasAnalysis, indices: readonly number[]): number | null {
  if (indices.length < 4 || !analysis.hasStandard) return null
  const half = Math.floor(indices.length / 2)
  const mean = (part: readonly number[]): number => {
    let total = 0
    let count = 0
    for (const index of part) {
      const value = areaRatio(injections, analysis.keyReactant, analysis.base, index)
      if (value === null) continue
      total += value
      count++
    }
    return count > 0 ? total / count : Number.NaN
  }
  const drift = mean(indices.slice(indices.length - half)) / mean(indices.slice(0, half)) - 1
  return Number.isFinite(drift) ? drift : null
}

/**
 * What went into the reactor, from the bypass injections or the flow controllers.
 *
 * The method says which; the controllers stand in where no bypass injection can be used, and a note says so.
 * Source: common practice.
 *
 * @param injections - the analyser's table [counts or mole fraction]
 * @param analysis - which peak serves for what [-]
 * @param indices - bypass injections to use, from 0 [-]
 * @param flowMolPerS - mean flows by the controllers [mol s-1]
 * @param method - inlet source [-]
 * @returns the inlet with its cautions [-]
 */
export function measureInlet(
  injections: InjectionTable,
  analysis: GasAnalysis,
  indices: readonly number[],
  flowMolPerS: Readonly<Record<Species, number>>,
  method: ReductionMethod,
): MeasuredInlet {
  const baseFlow = flowMolPerS[analysis.base] ?? Number.NaN
  const flowRatio: Record<Species, number> = {}
  for (const species of Object.keys(flowMolPerS).sort()) flowRatio[species] = (flowMolPerS[species] ?? 0) / baseFlow
  const means = indices.length > 0 ? meanRatios(injections, analysis, indices) : null
  const isUsable = means !== null && (means.ratio[analysis.keyReactant] ?? 0) > 0
  if (method.inletSource === 'controllers' || !isUsable) {
    const inlet: Inlet = { source: 'controllers', means: null, flowRatio, injectionNumbers: [], indices: [] }
    return {
      inlet,
      cautions: method.inletSource === 'bypass' ? [raiseCaution('no-bypass', { value: null, limit: null })] : [],
    }
  }
  const drift = driftOf(injections, analysis, indices)
  return {
    inlet: {
      source: 'bypass',
      means,
      flowRatio,
      injectionNumbers: indices.map((index) => injections.number[index] ?? index + 1),
      indices,
    },
    cautions:
      drift !== null && Math.abs(drift) > BYPASS_DRIFT_LIMIT
        ? [raiseCaution('bypass-drift', { value: drift, limit: BYPASS_DRIFT_LIMIT })]
        : [],
  }
}

/**
 * Mole fractions of the feed.
 *
 * From the bypass where every gas of the feed is analysed, else the controllers' shares.
 * Source: common practice.
 *
 * @param analysis - which peak serves for what [-]
 * @param inlet - what went in [-]
 * @param flowMolPerS - mean flows by the controllers during the hold [mol s-1]
 * @returns fractions that add up to one [-]
 */
export function inletMoleFractions(
  analysis: GasAnalysis,
  inlet: Inlet,
  flowMolPerS: Readonly<Record<Species, number>>,
): Record<Species, number> {
  const fed = Object.keys(flowMolPerS)
    .filter((species) => (flowMolPerS[species] ?? 0) > 0)
    .sort()
  const means = inlet.means
  const isAnalysed = means !== null && fed.every((species) => (means.seen[species] ?? 0) > 0)
  const amount = (species: Species): number =>
    isAnalysed ? (means.ratio[species] ?? 0) * (analysis.factor[species] ?? 0) : (flowMolPerS[species] ?? 0)
  const names = isAnalysed ? analysis.species.filter((species) => amount(species) > 0) : fed
  let total = 0
  for (const species of names) total += amount(species)
  const fractions: Record<Species, number> = {}
  for (const species of names) fractions[species] = amount(species) / total
  return fractions
}
