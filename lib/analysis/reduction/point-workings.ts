import { type Estimate } from '../estimate'
import { numberText } from '../number-text'
import { totalUncertainty } from '../total-uncertainty'
import { type Working } from '../working'
import { estimateSymbol, plainSymbol } from '../working-symbols'
import { type HoldConditions } from './hold-conditions'
import { type HoldConversion, type Inlet } from './conversion'
import { type GasAnalysis } from './gas-analysis'
import { type RateResult } from './rate'
import { type RunInput } from './run-input'
import { type Point } from './run-reduction'

/** What the workings of one point are written from. */
export interface WorkingContext {
  readonly input: RunInput
  readonly analysis: GasAnalysis
  readonly inlet: Inlet
  readonly conditions: HoldConditions
  readonly conversion: HoldConversion
  readonly rate: RateResult | null
  /** rows of the analyser file behind the injections used */
  readonly injectionRows: readonly (readonly [number, number])[]
  /** injections of the hold that were left out, with reasons */
  readonly leftOut: readonly string[]
  readonly scatter: { readonly products: number | null; readonly reactant: number | null; readonly inlet: number }
}

const STANDARD_ROUTE = 'O. Levenspiel, Chemical Reaction Engineering, 3rd edition, 1999, chapter 4'
const BED_SOURCE = 'O. Levenspiel, Chemical Reaction Engineering, 3rd edition, 1999, chapters 5 and 18'
const COMMON = 'common practice'

function partsInWords(estimate: Estimate | null): string[] {
  if (estimate === null || estimate.value === 0) return []
  const percent = (value: number): string => `${numberText((100 * value) / Math.abs(estimate.value), 2)} %`
  const own = estimate.randomStandardUncertainty
  const words = [
    own === null
      ? 'The scatter of one injection is not known.'
      : `Own part ${percent(own)}, ${estimate.degreesOfFreedom === null ? 'infinite' : numberText(estimate.degreesOfFreedom, 3)} degrees of freedom (scatter pooled over the run).`,
  ]
  const shared = Object.keys(estimate.sharedEffects)
    .sort()
    .map((id) => ({ id, effect: estimate.sharedEffects[id] ?? 0 }))
    .filter(({ effect }) => effect !== 0)
    .sort((a, b) => Math.abs(b.effect) - Math.abs(a.effect) || (a.id < b.id ? -1 : 1))
  if (shared.length > 0) {
    words.push(`Shared parts: ${shared.map(({ id, effect }) => `${id} ${percent(effect)}`).join(', ')}.`)
  }
  return words
}

function rowsInWords(rows: readonly (readonly [number, number])[]): string {
  const spans = rows.filter(([first]) => Number.isFinite(first))
  if (spans.length === 0) return ''
  return `, rows ${spans.map(([first, last]) => (last > first ? `${first} to ${last}` : String(first))).join(', ')}`
}

/**
 * The full derivation of every number of one point.
 *
 * Source: as stated in each working.
 *
 * @param point - the point without workings [SI]
 * @param context - what it was made from [SI]
 * @returns workings keyed by field name [practical units, stated in each]
 */
export function pointWorkings(
  point: Omit<Point, 'workings'>,
  context: WorkingContext,
): Readonly<Record<string, Working>> {
  const { input, analysis, inlet, conditions, conversion, rate, scatter } = context
  const hold = `hold ${point.hold.number} of ${input.runCode}`
  const { keyReactant } = analysis
  const logFrom =
    conditions.firstRow === null
      ? `${input.log.fileName}: ${conditions.rows} rows`
      : `${input.log.fileName}: rows ${conditions.firstRow} to ${conditions.lastRow ?? conditions.firstRow} (${conditions.rows})`
  const analyserFrom = `${input.injections.fileName}: injections ${point.injectionsUsed.join(', ')}${rowsInWords(context.injectionRows)}`
  const inletFrom =
    inlet.source === 'bypass'
      ? `feed: ${input.injections.fileName}, bypass injections ${inlet.injectionNumbers.join(', ')}`
      : `feed: flow controllers, ${input.log.fileName}`
  const gasFrom = [analyserFrom, inletFrom]
  const { leftOut } = context
  const scatterNote =
    scatter.products === null
      ? []
      : [
          `One injection scatters by ${numberText(scatter.products * 100, 2)} % (products), pooled over the holds of the run.`,
        ]
  const factorSymbols = analysis.products.map((product) =>
    plainSymbol(
      `f_${product.species}`,
      `response factor of ${product.species}`,
      analysis.factor[product.species] ?? null,
      input.injections.quantity === 'area' ? 'mole fraction per count' : '',
      (analysis.factor[product.species] ?? 0) * (analysis.factorUncertainty[product.species]?.relative ?? 0),
      'shared',
    ),
  )
  const ratioSymbols = analysis.products.map((product) =>
    plainSymbol(
      `a_${product.species}`,
      `area of ${product.species} over that of ${analysis.base}, mean of ${conversion.means.seen[product.species] ?? 0} injections`,
      conversion.means.ratio[product.species] ?? null,
      '',
    ),
  )
  const keyOut = plainSymbol(
    `a_${keyReactant}`,
    `area of ${keyReactant} over that of ${analysis.base}`,
    conversion.means.ratio[keyReactant] ?? null,
    '',
  )
  const keyIn =
    inlet.means === null
      ? plainSymbol(
          `R_${keyReactant}0`,
          `flow of ${keyReactant} over that of ${analysis.base}`,
          inlet.flowRatio[keyReactant] ?? null,
          '',
        )
      : plainSymbol(
          `a_${keyReactant}0`,
          `area of ${keyReactant} over that of ${analysis.base} through the bypass`,
          inlet.means.ratio[keyReactant] ?? null,
          '',
          (inlet.means.ratio[keyReactant] ?? 0) * scatter.inlet,
          'shared',
        )
  const weights = analysis.isCarbon
    ? 'n carbon atoms'
    : `n moles of ${keyReactant} used up per mole of product, by stoichiometry`
  const X = estimateSymbol('X', `conversion of ${keyReactant}`, point.conversion, '%', 100)
  const F = estimateSymbol(`F_${keyReactant}0`, `flow of ${keyReactant} fed`, point.keyFlowMolPerS, 'µmol s⁻¹', 1e6)
  const W = plainSymbol(
    'W',
    'mass of catalyst',
    input.loading.catalystMassKg * 1e6,
    'mg',
    input.loading.catalystMassKg * 1e6 * input.loading.massRelativeStandardUncertainty,
    'shared',
  )
  const T = estimateSymbol('T', 'mean bed temperature', point.temperatureK, '°C', 1, -273.15)
  const workings: Record<string, Working> = {
    temperatureK: {
      title: `Temperature at ${hold}`,
      formula: 'T = mean of the bed thermocouple over the settled part of the hold',
      symbols: [
        plainSymbol('T_set', 'set temperature', point.hold.setTemperatureK - 273.15, '°C'),
        plainSymbol('t_s', 'settling time left out', input.method.settlingTimeS / 60, 'min'),
      ],
      result: T,
      assumptions: ['The bed is isothermal; an offset of the thermocouple is common to all holds.'],
      source: COMMON,
      from: [logFrom],
      leftOut: [],
      notes: ['The own part is the standard error of ten block means.'],
    },
    conversionByProducts: {
      title: `Conversion by the products at ${hold}`,
      formula: analysis.hasStandard
        ? 'X = Σ n_j (R_j − R_j0) / (n_A R_A0), R_i = f_i a_i / f_S'
        : 'X = P / (P + n_A y_A), P = Σ n_j y_j',
      symbols: [...ratioSymbols, ...factorSymbols, keyIn],
      result: estimateSymbol('X', `conversion of ${keyReactant}`, point.conversionByProducts, '%', 100),
      assumptions: [
        `${weights}; products that the analyser does not see are missed.`,
        analysis.hasStandard
          ? `${analysis.base} neither reacts nor condenses; wet or dry makes no difference.`
          : 'Everything that carries carbon is seen: the carbon balance is forced to close.',
      ],
      source: STANDARD_ROUTE,
      from: gasFrom,
      leftOut,
      notes: [...partsInWords(point.conversionByProducts), ...scatterNote],
    },
    conversionByReactant: {
      title: `Conversion by the reactant at ${hold}`,
      formula: 'X = 1 − R_A / R_A0',
      symbols: [keyOut, keyIn],
      result: estimateSymbol('X', `conversion of ${keyReactant}`, point.conversionByReactant, '%', 100),
      assumptions: ['A small difference of two large areas: useless at low conversion, the better route at high.'],
      source: STANDARD_ROUTE,
      from: gasFrom,
      leftOut,
      notes: partsInWords(point.conversionByReactant),
    },
    conversion: {
      title: `Conversion at ${hold}`,
      formula:
        point.conversionRoute === 'reactant'
          ? 'X = X by the reactant'
          : point.conversionRoute === 'products'
            ? 'X = X by the products'
            : 'no route gives a conversion',
      symbols: [
        estimateSymbol('X_P', 'by the products', point.conversionByProducts, '%', 100),
        estimateSymbol('X_R', 'by the reactant', point.conversionByReactant, '%', 100),
        plainSymbol('z', 'difference of the routes over its uncertainty', point.routeConsistencyZ, ''),
      ],
      result: X,
      assumptions: ['Below 10 % the products decide, above 90 % the reactant, between them the surer one.'],
      source: STANDARD_ROUTE,
      from: gasFrom,
      leftOut,
      notes: partsInWords(point.conversion),
    },
    carbonBalance: {
      title: `Carbon balance at ${hold}`,
      formula: 'B = (n_A R_A + Σ n_j R_j) / (n_A R_A0 + Σ n_j R_j0)',
      symbols: [keyOut, keyIn, ...ratioSymbols, ...factorSymbols],
      result: estimateSymbol('B', 'carbon out over carbon in', point.carbonBalance, ''),
      assumptions: ['All carbon leaves as analysed gas.'],
      source: COMMON,
      from: gasFrom,
      leftOut,
      notes: partsInWords(point.carbonBalance),
    },
    carbonSelectivity: {
      title: `Carbon selectivity at ${hold}`,
      formula: 'S_j = n_j (R_j − R_j0) / Σ n_k (R_k − R_k0)',
      symbols: [...ratioSymbols, ...factorSymbols],
      result: estimateSymbol(
        `S_${analysis.products[0]?.species ?? ''}`,
        `share of the converted carbon found as ${analysis.products[0]?.species ?? 'product'}`,
        point.carbonSelectivity[analysis.products[0]?.species ?? ''] ?? null,
        '%',
        100,
      ),
      assumptions: [weights],
      source: COMMON,
      from: gasFrom,
      leftOut,
      notes: analysis.products.flatMap((product) => {
        const selectivity = point.carbonSelectivity[product.species]
        if (selectivity === undefined) return []
        const u = totalUncertainty(selectivity)
        return [
          `${product.species}: ${numberText(selectivity.value * 100, 4)} %${u === null ? '' : ` ± ${numberText(u.standardUncertainty * 100, 2)} % (one standard uncertainty)`}`,
        ]
      }),
    },
    meanRateMolPerKgS: {
      title: `Mean rate at ${hold}`,
      formula: 'r = F_A0 · X / W',
      symbols: [F, X, W],
      result: estimateSymbol('r', 'net rate, mean over the bed', point.meanRateMolPerKgS, 'µmol g⁻¹ s⁻¹', 1e3),
      assumptions: ['Belongs to the mean composition of the bed.'],
      source: BED_SOURCE,
      from: [...gasFrom, logFrom],
      leftOut,
      notes: partsInWords(point.meanRateMolPerKgS),
    },
    approachToEquilibrium: {
      title: `Approach to equilibrium at ${hold}`,
      formula: 'η = Π (p_i / 1 bar)^ν_i / K',
      symbols: [T, plainSymbol('p', 'mean pressure', point.meanPressurePa / 1e5, 'bar'), X],
      result: plainSymbol('η', 'approach of the main step at the outlet', point.approachToEquilibrium, ''),
      assumptions: ['Ideal gas; composition at the outlet from the feed and the conversions.'],
      source: 'B. J. McBride, S. Gordon, M. A. Reno, NASA Technical Memorandum 4513, 1993',
      from: [...gasFrom, logFrom],
      leftOut,
      notes:
        point.approachToEquilibrium === null ? ['No thermochemistry is at hand for a species of the main step.'] : [],
    },
  }
  const isIntegral = input.method.rateLaw === 'integral-plug-flow'
  const orders = input.method.rateOrders
    .map((record, s) => {
      const words = Object.keys(record)
        .sort()
        .map((species) => `${species} ${numberText(record[species] ?? 0, 2)}`)
      return `step ${s + 1}: ${words.length > 0 ? words.join(', ') : 'zero order'}`
    })
    .join('; ')
  workings['rateMolPerKgS'] = {
    title: `Rate at ${hold}`,
    formula: isIntegral
      ? 'r = (F_A0 / W) Σ R_s, dX_s/dz = R_s Π (p_i/p_i0)^a_i (1 − η_s), X_s(z = 1) as measured'
      : 'r = F_A0 · X / (W (1 − η))',
    symbols: [
      F,
      X,
      W,
      estimateSymbol('r_m', 'mean rate F_A0 X / W', point.meanRateMolPerKgS, 'µmol g⁻¹ s⁻¹', 1e3),
      plainSymbol('r/r_m', 'correction by the law', rate?.correction ?? null, ''),
      plainSymbol('p', 'mean pressure', point.meanPressurePa / 1e5, 'bar'),
      ...conversion.stepConversions.map((value, s) =>
        plainSymbol(`X_${s + 1}`, `conversion by step ${s + 1}`, value * 100, '%'),
      ),
    ],
    result: estimateSymbol('r', 'forward rate at feed composition', point.rateMolPerKgS, 'µmol g⁻¹ s⁻¹', 1e3),
    assumptions: isIntegral
      ? [
          `Plug flow, isothermal, at the mean pressure; orders in partial pressure from the method (${orders === '' ? 'zero order' : orders}).`,
          'The change of the number of moles is followed; steps run in parallel.',
        ]
      : ['Differential bed: the rate is taken as that at the feed.'],
    source: BED_SOURCE,
    from: [...gasFrom, logFrom],
    leftOut,
    notes: [
      ...partsInWords(point.rateMolPerKgS),
      ...(rate !== null && rate.reason !== '' ? [`No rate: ${rate.reason}.`] : []),
      ...(input.method.correctForEquilibrium
        ? rate !== null && !rate.isEquilibriumKnown
          ? ['The reverse reaction is left out where no thermochemistry is at hand.']
          : ['The reverse reaction is taken into account by the approach to equilibrium.']
        : ['The method leaves the reverse reaction out.']),
    ],
  }
  if (input.siteCount !== null) {
    workings['turnoverFrequencyPerS'] = {
      title: `Turnover frequency at ${hold}`,
      formula: 'TOF = r / n_s',
      symbols: [
        estimateSymbol('r', 'forward rate at feed composition', point.rateMolPerKgS, 'µmol g⁻¹ s⁻¹', 1e3),
        plainSymbol(
          'n_s',
          `sites by ${input.siteCount.method}`,
          input.siteCount.molPerKg * 1e3,
          'µmol g⁻¹',
          input.siteCount.molPerKg * 1e3 * input.siteCount.relativeStandardUncertainty,
          'shared',
        ),
      ],
      result: estimateSymbol('TOF', 'turnovers per site', point.turnoverFrequencyPerS, 's⁻¹'),
      assumptions: ['All counted sites work alike; they are those counted, not those at work.'],
      source: 'M. Boudart, Chem. Rev. 95 (1995) 661, doi:10.1021/cr00035a009',
      from: [...gasFrom, logFrom],
      leftOut,
      notes: partsInWords(point.turnoverFrequencyPerS),
    }
  }
  return workings
}
