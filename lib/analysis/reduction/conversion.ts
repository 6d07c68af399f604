import { type Estimate } from '../estimate'
import { poolVariance } from '../statistics/pooled-variance'
import { totalUncertainty } from '../total-uncertainty'
import { areaRatio, type GasAnalysis, meanRatios, type RatioMeans } from './gas-analysis'
import { type InjectionTable, type Species } from './run-input'
import { type Point } from './run-reduction'

/** What went in, per mole of the base. From the bypass it rests on the same factors as the outlet; from the controllers on none. */
export interface Inlet {
  readonly source: 'bypass' | 'controllers'
  /** mean area ratios of the bypass; null with controllers */
  readonly means: RatioMeans | null
  /** molar flow over that of the base, for controllers */
  readonly flowRatio: Readonly<Record<Species, number>>
  readonly injectionNumbers: readonly number[]
  readonly indices: readonly number[]
}

/** Conversion, selectivity and carbon balance of one hold. */
export interface HoldConversion {
  readonly means: RatioMeans
  readonly byProducts: Estimate | null
  readonly byReactant: Estimate | null
  readonly chosen: Estimate | null
  readonly route: Point['conversionRoute']
  readonly consistencyZ: number | null
  readonly carbonBalance: Estimate | null
  readonly carbonSelectivity: Readonly<Record<Species, Estimate>>
  /** conversion by each step of the reaction, product route scaled to the chosen conversion */
  readonly stepConversions: readonly number[]
}

export interface ConversionResult {
  readonly holds: readonly HoldConversion[]
  /** relative standard deviation of one injection: of the products' sum and of the reactant */
  readonly productScatter: number | null
  readonly reactantScatter: number | null
  readonly scatterDegreesOfFreedom: number | null
  /** relative standard uncertainty of the inlet ratio, shared by all holds of the run */
  readonly inletUncertainty: number
}

/** Below this the products decide alone, above the other the reactant; between, the smaller uncertainty. */
const PRODUCTS_BELOW = 0.1
const REACTANT_ABOVE = 0.9

interface Composition {
  readonly byProducts: number
  readonly byReactant: number
  readonly carbonBalance: number
  readonly perProduct: readonly number[]
}

type Factors = Readonly<Record<Species, number>>

// All routes from mean ratios, as a function of the response factors: what a factor does to a number is found by moving the factor.
function compose(analysis: GasAnalysis, outlet: RatioMeans['ratio'], inlet: Inlet, factors: Factors): Composition {
  const { base, keyReactant, keyWeight, products } = analysis
  const f = (species: Species): number => factors[species] ?? Number.NaN
  const out = (species: Species): number => ((outlet[species] ?? 0) * f(species)) / f(base)
  const fed = (species: Species): number =>
    inlet.means === null ? (inlet.flowRatio[species] ?? 0) : ((inlet.means.ratio[species] ?? 0) * f(species)) / f(base)
  if (!analysis.hasStandard) {
    // carbon-normalised: the analysed key reactant and products are taken to be everything
    let total = keyWeight * out(keyReactant)
    let totalFed = keyWeight * fed(keyReactant)
    for (const product of products) {
      total += product.weight * out(product.species)
      totalFed += product.weight * fed(product.species)
    }
    const share = (keyWeight * fed(keyReactant)) / totalFed
    const perProduct = products.map(
      (product) =>
        ((product.weight * out(product.species)) / total - (product.weight * fed(product.species)) / totalFed) / share,
    )
    return {
      byProducts: perProduct.reduce((sum, value) => sum + value, 0),
      byReactant: Number.NaN,
      carbonBalance: Number.NaN,
      perProduct,
    }
  }
  const keyIn = keyWeight * fed(keyReactant)
  const keyOut = keyWeight * out(keyReactant)
  const perProduct = products.map((product) => (product.weight * (out(product.species) - fed(product.species))) / keyIn)
  let carbonIn = keyIn
  let carbonOut = keyOut
  for (const product of products) {
    carbonIn += product.weight * fed(product.species)
    carbonOut += product.weight * out(product.species)
  }
  return {
    byProducts: perProduct.reduce((sum, value) => sum + value, 0),
    byReactant: 1 - keyOut / keyIn,
    carbonBalance: carbonOut / carbonIn,
    perProduct,
  }
}

// Change of any number of the composition for plus one standard uncertainty of each response factor.
function factorEffects(
  analysis: GasAnalysis,
  outlet: RatioMeans['ratio'],
  inlet: Inlet,
  read: (composition: Composition) => number,
): Record<string, number> {
  const nominal = read(compose(analysis, outlet, inlet, analysis.factor))
  const effects: Record<string, number> = {}
  for (const species of analysis.species) {
    const stated = analysis.factorUncertainty[species]
    if (stated === undefined || stated.sourceId === null || !(stated.relative > 0)) continue
    const moved = { ...analysis.factor, [species]: (analysis.factor[species] ?? 0) * (1 + stated.relative) }
    const effect = read(compose(analysis, outlet, inlet, moved)) - nominal
    // a factor that cancels leaves the last digits of a subtraction behind, which are nobody's effect
    if (Math.abs(effect) > 1e-12 * Math.max(1, Math.abs(nominal)))
      effects[stated.sourceId] = (effects[stated.sourceId] ?? 0) + effect
  }
  return effects
}

/**
 * Conversion seen by one injection, product route.
 *
 * @param injections - the analyser's table [counts or mole fraction]
 * @param analysis - which peak serves for what [-]
 * @param inlet - what went in [-]
 * @param index - which injection, from 0 [-]
 * @returns the conversion; null where base or all products are not seen [-]
 */
export function conversionOfInjection(
  injections: InjectionTable,
  analysis: GasAnalysis,
  inlet: Inlet,
  index: number,
): number | null {
  const means = meanRatios(injections, analysis, [index])
  if (!analysis.products.some((product) => (means.seen[product.species] ?? 0) > 0)) return null
  if (!((means.seen[analysis.base] ?? 0) > 0)) return null
  return compose(analysis, means.ratio, inlet, analysis.factor).byProducts
}

function minus(a: Estimate, b: Estimate): Estimate {
  const sharedEffects: Record<string, number> = { ...a.sharedEffects }
  for (const [id, effect] of Object.entries(b.sharedEffects)) sharedEffects[id] = (sharedEffects[id] ?? 0) - effect
  const ua = a.randomStandardUncertainty
  const ub = b.randomStandardUncertainty
  return {
    value: a.value - b.value,
    randomStandardUncertainty: ua === null || ub === null ? null : Math.sqrt(ua * ua + ub * ub),
    degreesOfFreedom: a.degreesOfFreedom,
    sharedEffects,
  }
}

function choose(
  byProducts: Estimate | null,
  byReactant: Estimate | null,
): { chosen: Estimate | null; route: Point['conversionRoute'] } {
  if (byProducts === null) {
    // a reactant's difference alone is believed only where it is large
    return byReactant !== null && byReactant.value >= PRODUCTS_BELOW
      ? { chosen: byReactant, route: 'reactant' }
      : { chosen: null, route: 'none' }
  }
  if (byReactant === null || byProducts.value < PRODUCTS_BELOW) return { chosen: byProducts, route: 'products' }
  if (byProducts.value > REACTANT_ABOVE) return { chosen: byReactant, route: 'reactant' }
  const p = totalUncertainty(byProducts)?.standardUncertainty ?? Number.POSITIVE_INFINITY
  const r = totalUncertainty(byReactant)?.standardUncertainty ?? Number.POSITIVE_INFINITY
  return r < p ? { chosen: byReactant, route: 'reactant' } : { chosen: byProducts, route: 'products' }
}

/** One hold's injections. */
export interface HoldInjections {
  readonly indices: readonly number[]
}

interface Scatter {
  readonly products: { readonly variance: number; readonly degreesOfFreedom: number } | null
  readonly reactant: { readonly variance: number; readonly degreesOfFreedom: number } | null
  readonly selectivity: ReadonlyMap<Species, { readonly variance: number; readonly degreesOfFreedom: number }>
}

// Relative variance of one injection, pooled over all holds of the run: each hold's own mean, one common scatter.
function poolScatter(
  injections: InjectionTable,
  analysis: GasAnalysis,
  inlet: Inlet,
  holds: readonly HoldInjections[],
): Scatter {
  const relative = (values: readonly (number | null)[]): number[] => {
    const seen = values.filter((value) => value !== null)
    let mean = 0
    for (const value of seen) mean += value
    mean /= seen.length
    return mean > 0 ? seen.map((value) => value / mean) : []
  }
  const products = poolVariance(
    holds.map((hold) =>
      relative(hold.indices.map((index) => conversionOfInjection(injections, analysis, inlet, index))),
    ),
  )
  const keyRatio = (index: number): number | null => areaRatio(injections, analysis.keyReactant, analysis.base, index)
  const reactant = analysis.hasStandard
    ? poolVariance([
        ...holds.map((hold) => relative(hold.indices.map(keyRatio))),
        relative(inlet.indices.map(keyRatio)),
      ])
    : null
  const selectivity = new Map<Species, { variance: number; degreesOfFreedom: number }>()
  analysis.products.forEach((product, p) => {
    const pooled = poolVariance(
      holds.map((hold) =>
        relative(
          hold.indices.map((index) => {
            const means = meanRatios(injections, analysis, [index])
            if (!((means.seen[product.species] ?? 0) > 0)) return null
            const composition = compose(analysis, means.ratio, inlet, analysis.factor)
            return composition.byProducts > 0 ? (composition.perProduct[p] ?? 0) / composition.byProducts : null
          }),
        ),
      ),
    )
    if (pooled !== null) selectivity.set(product.species, pooled)
  })
  return { products, reactant, selectivity }
}

/**
 * Conversion by products and by reactant, carbon selectivity and carbon balance of every hold of a run.
 *
 * With an internal standard S and R_i = (y_i / y_S): X_products = sum_j n_j (R_j - R_j0) / (n_A R_A0), X_reactant = 1 - R_A / R_A0, balance =
 * (n_A R_A + sum n_j R_j) / (n_A R_A0 + sum n_j R_j0), n carbon atoms. Without one, X = P / (P + n_A y_A), which forces the balance to one: none is
 * given. Correct on a dry analysis and for any number of reactions as long as S neither reacts nor condenses; products not analysed are missed.
 * The scatter of one injection is pooled over the run; the inlet's own scatter is shared by all holds; each response factor's effect is found by
 * moving it by one standard uncertainty. Below 10 % conversion the products decide, above 90 % the reactant, between them the surer one.
 * Source: O. Levenspiel, Chemical Reaction Engineering, 3rd edition, 1999, chapter 4; JCGM 100:2008, 5.1 (parts).
 *
 * @param injections - the analyser's table [counts or mole fraction]
 * @param analysis - which peak serves for what [-]
 * @param inlet - what went in [-]
 * @param holds - injections of each hold [-]
 * @param stepCount - steps of the reaction [-]
 * @param inletSourceId - id of the inlet's scatter as a shared source [-]
 * @returns one entry a hold, in order, and the scatter found; degrees of freedom are those of the pooled scatter [-]
 */
export function measureConversions(
  injections: InjectionTable,
  analysis: GasAnalysis,
  inlet: Inlet,
  holds: readonly HoldInjections[],
  stepCount: number,
  inletSourceId: string,
): ConversionResult {
  const scatter = poolScatter(injections, analysis, inlet, holds)
  const inletUncertainty =
    inlet.means !== null && scatter.reactant !== null && inlet.means.count > 0
      ? Math.sqrt(scatter.reactant.variance / inlet.means.count)
      : 0
  const withInlet = (effects: Record<string, number>, effect: number): Record<string, number> =>
    inletUncertainty > 0 ? { ...effects, [inletSourceId]: effect * inletUncertainty } : effects
  const results = holds.map((hold): HoldConversion => {
    const means = meanRatios(injections, analysis, hold.indices)
    const composition = compose(analysis, means.ratio, inlet, analysis.factor)
    const effectsOn = (read: (composition: Composition) => number): Record<string, number> =>
      factorEffects(analysis, means.ratio, inlet, read)
    const isSeen = analysis.products.some((product) => (means.seen[product.species] ?? 0) > 0)
    const m = hold.indices.length
    const X = composition.byProducts
    const byProducts: Estimate | null =
      isSeen && m > 0
        ? {
            value: X,
            randomStandardUncertainty:
              scatter.products === null ? null : Math.abs(X) * Math.sqrt(scatter.products.variance / m),
            degreesOfFreedom: scatter.products?.degreesOfFreedom ?? null,
            sharedEffects: withInlet(
              effectsOn((c) => c.byProducts),
              analysis.hasStandard ? -X : 0,
            ),
          }
        : null
    const keyScatter = scatter.reactant === null ? null : Math.sqrt(scatter.reactant.variance / Math.max(1, m))
    const byReactant: Estimate | null =
      analysis.hasStandard && m > 0
        ? {
            value: composition.byReactant,
            randomStandardUncertainty: keyScatter === null ? null : (1 - composition.byReactant) * keyScatter,
            degreesOfFreedom: scatter.reactant?.degreesOfFreedom ?? null,
            sharedEffects: withInlet(
              effectsOn((c) => c.byReactant),
              1 - composition.byReactant,
            ),
          }
        : null
    const { chosen, route } = choose(byProducts, byReactant)
    const carbonBalance: Estimate | null =
      analysis.hasStandard && analysis.isCarbon && m > 0
        ? {
            value: composition.carbonBalance,
            randomStandardUncertainty:
              keyScatter === null
                ? null
                : Math.sqrt(
                    (1 - composition.byReactant) * keyScatter * (1 - composition.byReactant) * keyScatter +
                      (byProducts?.randomStandardUncertainty ?? 0) * (byProducts?.randomStandardUncertainty ?? 0),
                  ),
            degreesOfFreedom: scatter.reactant?.degreesOfFreedom ?? null,
            sharedEffects: withInlet(
              effectsOn((c) => c.carbonBalance),
              -composition.carbonBalance,
            ),
          }
        : null
    const carbonSelectivity: Record<Species, Estimate> = {}
    const stepConversions = Array.from({ length: stepCount }, () => 0)
    analysis.products.forEach((product, p) => {
      const part = composition.perProduct[p] ?? 0
      const scale = chosen !== null && X > 0 ? chosen.value / X : 0
      stepConversions[product.step] = (stepConversions[product.step] ?? 0) + part * scale
      if (!(X > 0) || !isSeen) return
      const pooled = scatter.selectivity.get(product.species)
      const isOnly = analysis.products.length === 1
      carbonSelectivity[product.species] = {
        value: part / X,
        randomStandardUncertainty: isOnly
          ? 0
          : pooled === undefined
            ? null
            : Math.abs(part / X) * Math.sqrt(pooled.variance / m),
        degreesOfFreedom: pooled?.degreesOfFreedom ?? null,
        sharedEffects: isOnly ? {} : effectsOn((c) => (c.perProduct[p] ?? 0) / c.byProducts),
      }
    })
    let consistencyZ: number | null = null
    if (byProducts !== null && byReactant !== null) {
      const difference = minus(byReactant, byProducts)
      const u = totalUncertainty(difference)
      consistencyZ = u === null || !(u.standardUncertainty > 0) ? null : difference.value / u.standardUncertainty
    }
    if (chosen !== null && route === 'reactant' && !(X > 0) && stepCount > 0) stepConversions[0] = chosen.value
    return {
      means,
      byProducts,
      byReactant,
      chosen,
      route,
      consistencyZ,
      carbonBalance,
      carbonSelectivity,
      stepConversions,
    }
  })
  return {
    holds: results,
    productScatter: scatter.products === null ? null : Math.sqrt(scatter.products.variance),
    reactantScatter: scatter.reactant === null ? null : Math.sqrt(scatter.reactant.variance),
    scatterDegreesOfFreedom: scatter.products?.degreesOfFreedom ?? null,
    inletUncertainty,
  }
}
