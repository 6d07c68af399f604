import { AnalysisError } from '../analysis-error'
import { elementCount } from '../element-count'
import { type InjectionTable, type ReactionInput, type ResponseFactor, type Species } from './run-input'

/** A product that the analyser sees, and what one mole of it says about the key reactant. */
export interface AnalysedProduct {
  readonly species: Species
  /** carbon atoms; for a reactant without carbon, moles of key reactant used up per mole */
  readonly weight: number
  /** step of the reaction that makes it, from 0 */
  readonly step: number
}

/** Which peaks serve for what. */
export interface GasAnalysis {
  readonly keyReactant: Species
  /** weight of the key reactant on the scale of the products' weights */
  readonly keyWeight: number
  readonly isCarbon: boolean
  readonly products: readonly AnalysedProduct[]
  /** peak that the others are divided by: the internal standard, or the key reactant where there is none */
  readonly base: Species
  readonly hasStandard: boolean
  /** mole fraction per area; 1 where the file gives fractions */
  readonly factor: Readonly<Record<Species, number>>
  readonly factorUncertainty: Readonly<Record<Species, { readonly relative: number; readonly sourceId: string | null }>>
  /** every species with a factor, the condensed ones left out */
  readonly species: readonly Species[]
}

/** Mean of area over area of the base, species by species; a species never seen is 0. */
export interface RatioMeans {
  readonly ratio: Readonly<Record<Species, number>>
  /** injections in which the species was seen */
  readonly seen: Readonly<Record<Species, number>>
  readonly count: number
}

function carbonAtoms(reaction: ReactionInput, species: Species): number {
  const stated = reaction.carbonNumber[species]
  if (stated !== undefined) return stated
  try {
    return elementCount(species)['C'] ?? 0
  } catch (error) {
    // a peak that is named by words, not by a formula, is not carbon that could be counted
    if (error instanceof AnalysisError) return 0
    throw error
  }
}

function productsOf(
  reaction: ReactionInput,
  species: readonly Species[],
  excluded: readonly (Species | null)[],
  isCarbon: boolean,
): AnalysedProduct[] {
  return species.flatMap((name): AnalysedProduct[] => {
    if (excluded.includes(name)) return []
    const step = reaction.steps.findIndex((candidate) => (candidate[name] ?? 0) > 0)
    if (isCarbon) {
      const weight = carbonAtoms(reaction, name)
      return weight > 0 ? [{ species: name, weight, step: Math.max(0, step) }] : []
    }
    const stoichiometry = reaction.steps[step]
    if (stoichiometry === undefined) return []
    // one marker a step is enough; a second product of the same step would count the reactant twice
    const marker = species.find((candidate) => !excluded.includes(candidate) && (stoichiometry[candidate] ?? 0) > 0)
    if (marker !== name) return []
    return [{ species: name, weight: -(stoichiometry[reaction.keyReactant] ?? 0) / (stoichiometry[name] ?? 1), step }]
  })
}

/**
 * Sorts the analyser's peaks into key reactant, standard and products.
 *
 * Products are weighed by carbon where the key reactant has some, else by stoichiometry with one marker a step. Condensed species are left out.
 * Source: common practice.
 *
 * @param injections - the analyser's table [counts or mole fraction]
 * @param responseFactors - per species [mole fraction per count]
 * @param reaction - steps and key reactant [-]
 * @param internalStandard - inert of the feed; null for none [-]
 * @param condensedSpecies - removed before the analyser [-]
 * @returns which peak serves for what [-]
 * @throws {AnalysisError} missing-input
 */
export function planGasAnalysis(
  injections: InjectionTable,
  responseFactors: Readonly<Record<Species, ResponseFactor>>,
  reaction: ReactionInput,
  internalStandard: Species | null,
  condensedSpecies: readonly Species[],
): GasAnalysis {
  const isFraction = injections.quantity === 'mole-fraction'
  const species = Object.keys(injections.response)
    .filter((name) => !condensedSpecies.includes(name) && (isFraction || responseFactors[name] !== undefined))
    .sort()
  const need = (name: Species, role: string): void => {
    if (injections.response[name] === undefined) {
      throw new AnalysisError('missing-input', `The analyser file has no column for ${name}, the ${role}.`, {
        species: name,
      })
    }
    if (!species.includes(name)) {
      throw new AnalysisError(
        'missing-input',
        `${name}, the ${role}, has no response factor valid at the time of the run.`,
        {
          species: name,
        },
      )
    }
  }
  need(reaction.keyReactant, 'key reactant')
  if (internalStandard !== null) need(internalStandard, 'internal standard')
  const keyCarbon = carbonAtoms(reaction, reaction.keyReactant)
  const isCarbon = keyCarbon > 0
  for (const step of reaction.steps) {
    for (const name of Object.keys(step).sort()) {
      const counts = isCarbon ? carbonAtoms(reaction, name) > 0 : false
      if (
        (step[name] ?? 0) > 0 &&
        counts &&
        injections.response[name] !== undefined &&
        !condensedSpecies.includes(name)
      ) {
        need(name, 'product')
      }
    }
  }
  const factor: Record<Species, number> = {}
  const factorUncertainty: Record<Species, { relative: number; sourceId: string | null }> = {}
  for (const name of species) {
    const stated = responseFactors[name]
    factor[name] = isFraction ? 1 : (stated?.molePerArea ?? Number.NaN)
    factorUncertainty[name] = {
      relative: stated?.relativeStandardUncertainty ?? 0,
      sourceId: stated?.sourceId ?? null,
    }
  }
  return {
    keyReactant: reaction.keyReactant,
    keyWeight: isCarbon ? keyCarbon : 1,
    isCarbon,
    products: productsOf(reaction, species, [reaction.keyReactant, internalStandard], isCarbon),
    base: internalStandard ?? reaction.keyReactant,
    hasStandard: internalStandard !== null,
    factor,
    factorUncertainty,
    species,
  }
}

/**
 * Area of one species over that of the base in one injection.
 *
 * @param injections - the analyser's table [counts or mole fraction]
 * @param species - which peak [-]
 * @param base - which peak to divide by [-]
 * @param index - which injection, from 0 [-]
 * @returns the ratio; null where the peak was not seen [-]
 */
export function areaRatio(injections: InjectionTable, species: Species, base: Species, index: number): number | null {
  const value = injections.response[species]?.[index] ?? Number.NaN
  const divisor = injections.response[base]?.[index] ?? Number.NaN
  if ((injections.isCensored[species]?.[index] ?? 0) > 0.5) return null
  return Number.isFinite(value) && divisor > 0 ? value / divisor : null
}

/**
 * Mean area ratios over several injections.
 *
 * @param injections - the analyser's table [counts or mole fraction]
 * @param analysis - which peak serves for what [-]
 * @param indices - injections to average, from 0 [-]
 * @returns means over the injections in which each species was seen, and how many those were [-]
 */
export function meanRatios(injections: InjectionTable, analysis: GasAnalysis, indices: readonly number[]): RatioMeans {
  const ratio: Record<Species, number> = {}
  const seen: Record<Species, number> = {}
  for (const species of analysis.species) {
    let total = 0
    let count = 0
    for (const index of indices) {
      const value = areaRatio(injections, species, analysis.base, index)
      if (value === null) continue
      total += value
      count++
    }
    ratio[species] = count > 0 ? total / count : 0
    seen[species] = count
  }
  return { ratio, seen, count: indices.length }
}
