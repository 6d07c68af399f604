import ln from '@stdlib/math-base-special-ln'
import log10 from '@stdlib/math-base-special-log10'
import { GAS_CONSTANT_J_PER_MOL_K } from '../units/constants'
import { effectivenessFromObserved } from './effectiveness-factor'
import { ergunPressureDrop } from './ergun-pressure-drop'
import { formatNumber } from '../units/format-number'
import { type AssumedInput, type RegimeCriterion, type RegimeInput, type RegimeVerdict } from './regime-input'
import { REGIME_DEFAULTS, type RegimeQuantity, regimeState, type RegimeState } from './regime-state'
import {
  bedHeatCriterion,
  dilutionError,
  filmHeatCriterion,
  filmMassCriterion,
  type HotParticle,
  pelletHeatCriterion,
  plugFlowBedLength,
  weiszPraterLimit,
  weiszPraterModulus,
} from './transport-criteria'

/** Limits of the criteria. Source: see each criterion. */
export const REGIME_LIMITS = {
  film: 0.15,
  pelletHeat: 0.75,
  bedHeat: 0.4,
  tubePerParticle: 10,
  bedPerParticle: 50,
  /** share of the pressure, divided by the order */
  pressureDrop: 0.1,
  dilution: 0.05,
  /** share of R T²/E */
  bedSpan: 0.05,
} as const

/** All criteria at one point. */
export interface RegimeReport {
  readonly criteria: readonly RegimeCriterion[]
  /** effectiveness factor of a first-order sphere that fits the observed rate, with the range that one standard uncertainty of the modulus spans; null when it cannot be said */
  readonly effectiveness: { readonly value: number; readonly low: number; readonly high: number } | null
  /** null when temperature, pressure, flow, mass, conversion or composition of the point are no usable numbers */
  readonly state: RegimeState | null
}

/** What a criterion is made of, before it is judged. */
interface Draft {
  readonly id: RegimeCriterion['id']
  readonly name: string
  readonly formula: string
  readonly source: string
  readonly mustBe: 'below' | 'above'
  readonly unit: string
  readonly limit: number | null
  readonly value: number | null
  /** relative standard uncertainties of the factors, each times its power */
  readonly relative: readonly number[]
  readonly assumed: readonly AssumedInput[]
  readonly missing: readonly string[]
}

/**
 * Whether transport falsifies the rate at one point: every usual criterion with value, limit, margin, assumed inputs and verdict.
 *
 * Verdict: pass or fail when the decimal logarithm of value over limit is larger than its standard uncertainty, cannot tell otherwise or when
 * an input is missing or impossible; it never throws, so that one odd point does not keep a run from being reduced. Inputs not entered are assumed from {@link REGIME_DEFAULTS} and named in the criterion.
 * Source: Mears, Ind. Eng. Chem. Process Des. Dev. 10 (1971) 541; Weisz and Prater, Adv. Catal. 6 (1954) 143; see the single criteria.
 *
 * @param given - temperature [K], pressure [Pa], flow [mol s-1], composition [-], observed rate [mol kg-1 s-1], orders [-], energies [J mol-1] and loading [SI] of the point
 * @returns criteria in a fixed order [-], and the effectiveness factor [-] of a first-order sphere
 */
export function regimeOfPoint(given: RegimeInput): RegimeReport {
  const missing = missingOfPoint(given)
  // nothing is computed from an impossible point: stand-ins only keep the list of criteria, each without a value
  const input = withoutNonNumbers(missing.length === 0 ? given : { ...given, ...STAND_INS })
  const state = regimeState(input)
  const pore = poreDraft(input, state)
  const drafts = [
    pore,
    ...heatAndFilmDrafts(input, state),
    axialDraft(input, state),
    wallDraft(input),
    lengthDraft(input, state),
    pressureDraft(input, state),
    dilutionDraft(input, state),
    spanDraft(input),
  ]
  if (missing.length > 0)
    return {
      criteria: drafts.map((draft) => judge({ ...draft, value: null, missing: [...missing, ...draft.missing] })),
      effectiveness: null,
      state: null,
    }
  return { criteria: drafts.map(judge), effectiveness: effectivenessOf(pore), state }
}

const STAND_INS = {
  temperatureK: 300,
  pressurePa: 100_000,
  totalFlowMolPerS: 1e-6,
  conversion: 0,
  inletMoleFraction: {},
} as const

function missingOfPoint(given: RegimeInput): string[] {
  const isPositive = (value: number) => Number.isFinite(value) && value > 0
  const fractions = Object.values(given.inletMoleFraction)
  return [
    ...(isPositive(given.temperatureK) ? [] : ['temperature']),
    ...(isPositive(given.pressurePa) ? [] : ['pressure']),
    ...(isPositive(given.totalFlowMolPerS) ? [] : ['flow']),
    ...(isPositive(given.loading.catalystMassKg) ? [] : ['catalyst mass']),
    ...(Number.isFinite(given.conversion) && given.conversion > -1 && given.conversion <= 1
      ? []
      : ['possible conversion']),
    ...(fractions.every((value) => Number.isFinite(value) && value >= 0) ? [] : ['composition of the feed']),
  ]
}

// A length or property that is no number above zero counts as not entered; it is then assumed and named, or missing.
function withoutNonNumbers(given: RegimeInput): RegimeInput {
  const known = (value: number | null | undefined) =>
    value !== null && value !== undefined && Number.isFinite(value) ? value : null
  const positive = (value: number | null) => (value !== null && Number.isFinite(value) && value > 0 ? value : null)
  const share = (value: number | null) => (value !== null && value > 0 && value < 1 ? value : null)
  const { loading } = given
  return {
    ...given,
    orderInKeyReactant: known(given.orderInKeyReactant),
    activationEnergyJPerMol: known(given.activationEnergyJPerMol),
    reactionEnthalpyJPerMol: known(given.reactionEnthalpyJPerMol),
    measuredBedSpanK: known(given.measuredBedSpanK),
    loading: {
      ...loading,
      diluentMassKg: known(loading.diluentMassKg) ?? 0,
      particleDiameterM: positive(loading.particleDiameterM),
      tubeInnerDiameterM: positive(loading.tubeInnerDiameterM),
      bedLengthM: positive(loading.bedLengthM),
      particleDensityKgPerM3: positive(loading.particleDensityKgPerM3),
      poreFraction: share(loading.poreFraction),
      tortuosity: positive(loading.tortuosity),
      meanPoreRadiusM: positive(loading.meanPoreRadiusM),
      bedVoidFraction: share(loading.bedVoidFraction),
    },
  }
}

// Observed rate per particle volume and what its uncertainty is made of; null without a rate.
function volumeRate(input: RegimeInput, state: RegimeState) {
  if (input.rateMolPerKgS === null || !Number.isFinite(input.rateMolPerKgS)) return null
  return {
    value: Math.abs(input.rateMolPerKgS) * state.particleDensity.value,
    relative: [input.rateRelativeStandardUncertainty, state.particleDensity.relativeStandardUncertainty],
    assumed: state.particleDensity.assumed,
  }
}

function poreDraft(input: RegimeInput, state: RegimeState): Draft {
  const rate = volumeRate(input, state)
  const diameter = input.loading.particleDiameterM
  const missing = [
    ...missingRate(rate),
    ...missingDiameter(diameter),
    ...missingDiffusivity(state),
    ...missingKey(state),
  ]
  const isComplete =
    rate !== null && diameter !== null && state.effectiveDiffusivity !== null && state.keyConcentrationMolPerM3 > 0
  return {
    id: 'pore-diffusion',
    name: 'diffusion in the particle',
    formula: 'Φ = r‴ R_p² / (D_e C_s)',
    source: 'Weisz and Prater, Adv. Catal. 6 (1954) 143',
    mustBe: 'below',
    unit: '1',
    limit: weiszPraterLimit(input.orderInKeyReactant),
    value: isComplete
      ? weiszPraterModulus(rate.value, diameter / 2, state.effectiveDiffusivity.value, state.keyConcentrationMolPerM3)
      : null,
    relative: [...(rate?.relative ?? []), state.effectiveDiffusivity?.relativeStandardUncertainty ?? 0],
    assumed: [...(rate?.assumed ?? []), ...(state.effectiveDiffusivity?.assumed ?? [])],
    missing,
  }
}

function heatAndFilmDrafts(input: RegimeInput, state: RegimeState): Draft[] {
  const rate = volumeRate(input, state)
  const diameter = input.loading.particleDiameterM
  const order = input.orderInKeyReactant ?? 1
  const base = [...missingRate(rate), ...missingDiameter(diameter)]
  const energy = activationEnergy(input)
  const particle: HotParticle | null =
    rate === null || diameter === null || input.reactionEnthalpyJPerMol === null
      ? null
      : {
          reactionEnthalpyJPerMol: input.reactionEnthalpyJPerMol,
          rateMolPerM3S: rate.value,
          radiusM: diameter / 2,
          activationEnergyJPerMol: energy.value,
          temperatureK: input.temperatureK,
        }
  const heatMissing = [...base, ...(input.reactionEnthalpyJPerMol === null ? ['reaction enthalpy'] : [])]
  const common = { mustBe: 'below', unit: '1' } as const
  const heat = {
    relative: [...(rate?.relative ?? []), energy.relativeStandardUncertainty],
    assumed: [...(rate?.assumed ?? []), ...energy.assumed],
  }
  const { filmMassCoefficient: film, filmHeatCoefficient: warm } = state
  const { particleConductivity, bedConductivity, wallBiot } = REGIME_DEFAULTS
  const tube = input.loading.tubeInnerDiameterM
  return [
    {
      ...common,
      id: 'film-mass',
      name: 'diffusion to the particle',
      formula: 'n r‴ R_p / (k_c C_b)',
      source: 'Mears, Ind. Eng. Chem. Process Des. Dev. 10 (1971) 541, particle-volume form',
      limit: REGIME_LIMITS.film,
      value:
        rate === null || diameter === null || film === null || !(state.keyConcentrationMolPerM3 > 0)
          ? null
          : filmMassCriterion(order, rate.value, diameter / 2, film.value, state.keyConcentrationMolPerM3),
      relative: [...(rate?.relative ?? []), film?.relativeStandardUncertainty ?? 0],
      assumed: [...(rate?.assumed ?? []), ...orderAssumed(input)],
      missing: [...base, ...missingGas(state), ...missingDiffusivity(state), ...missingKey(state)],
    },
    {
      ...common,
      id: 'film-heat',
      name: 'heat through the film',
      formula: '|ΔH| r‴ R_p E / (h R T²)',
      source: 'Mears, Ind. Eng. Chem. Process Des. Dev. 10 (1971) 541, particle-volume form',
      limit: REGIME_LIMITS.film,
      value: particle === null || warm === null ? null : filmHeatCriterion(particle, warm.value),
      relative: [...heat.relative, warm?.relativeStandardUncertainty ?? 0],
      assumed: heat.assumed,
      missing: [...heatMissing, ...missingGas(state)],
    },
    {
      ...common,
      id: 'pellet-heat',
      name: 'heat inside the particle',
      formula: '|ΔH| r‴ R_p² E / (λ_e R T²)',
      source: 'Anderson, Chem. Eng. Sci. 18 (1963) 147',
      limit: REGIME_LIMITS.pelletHeat,
      value: particle === null ? null : pelletHeatCriterion(particle, particleConductivity.value),
      relative: [...heat.relative, particleConductivity.relativeStandardUncertainty],
      assumed: [...heat.assumed, particleConductivity],
      missing: heatMissing,
    },
    {
      ...common,
      id: 'bed-heat',
      name: 'heat across the bed',
      formula: '|ΔH| r‴ (1−ε)(1−b) R_t² E / (λ R T_w²) · [1 + 8 R_p/(R_t Bi_w)]',
      source: 'Mears, J. Catal. 20 (1971) 127',
      limit: REGIME_LIMITS.bedHeat,
      value:
        particle === null || tube === null
          ? null
          : bedHeatCriterion(particle, {
              voidFraction: state.voidFraction.value,
              diluentFraction: state.diluentFraction.value,
              tubeRadiusM: tube / 2,
              conductivityWPerMK: bedConductivity.value,
              wallBiot: wallBiot.value,
            }),
      relative: [...heat.relative, bedConductivity.relativeStandardUncertainty, solidShare(state)],
      assumed: [
        ...heat.assumed,
        bedConductivity,
        wallBiot,
        ...state.voidFraction.assumed,
        ...state.diluentFraction.assumed,
      ],
      missing: [...heatMissing, ...missingTube(tube)],
    },
  ]
}

function axialDraft(input: RegimeInput, state: RegimeState): Draft {
  const diameter = input.loading.particleDiameterM
  const { bodenstein } = REGIME_DEFAULTS
  const isPossible = input.conversion > 0 && input.conversion < 1
  return {
    id: 'axial-dispersion',
    name: 'back-mixing along the bed',
    formula: '(L_b/d_p) / [(20 n/Bo) ln(1/(1−X))]',
    source: 'Mears, Chem. Eng. Sci. 26 (1971) 1361',
    mustBe: 'above',
    unit: '1',
    limit: 1,
    value:
      diameter === null || state.bedLength === null || !isPossible
        ? null
        : state.bedLength.value /
          diameter /
          plugFlowBedLength(input.orderInKeyReactant ?? 1, bodenstein.value, input.conversion),
    relative: [bodenstein.relativeStandardUncertainty, state.bedLength?.relativeStandardUncertainty ?? 0],
    assumed: [bodenstein, ...orderAssumed(input), ...(state.bedLength?.assumed ?? [])],
    missing: [
      ...missingDiameter(diameter),
      ...missingBed(state),
      ...(isPossible ? [] : ['conversion between 0 and 1']),
    ],
  }
}

function wallDraft({ loading }: RegimeInput): Draft {
  const { particleDiameterM: diameter, tubeInnerDiameterM: tube } = loading
  return {
    id: 'wall-flow',
    name: 'flow along the wall',
    formula: 'D_t / d_p',
    source: 'common practice',
    mustBe: 'above',
    unit: '1',
    limit: REGIME_LIMITS.tubePerParticle,
    value: diameter === null || tube === null ? null : tube / diameter,
    relative: [],
    assumed: [],
    missing: [...missingDiameter(diameter), ...missingTube(tube)],
  }
}

function lengthDraft({ loading }: RegimeInput, state: RegimeState): Draft {
  const diameter = loading.particleDiameterM
  return {
    id: 'bed-length',
    name: 'length of the bed',
    formula: 'L_b / d_p',
    source: 'common practice',
    mustBe: 'above',
    unit: '1',
    limit: REGIME_LIMITS.bedPerParticle,
    value: diameter === null || state.bedLength === null ? null : state.bedLength.value / diameter,
    relative: [state.bedLength?.relativeStandardUncertainty ?? 0],
    assumed: state.bedLength?.assumed ?? [],
    missing: [...missingDiameter(diameter), ...missingBed(state)],
  }
}

function pressureDraft(input: RegimeInput, state: RegimeState): Draft {
  const diameter = input.loading.particleDiameterM
  const {
    bedLength,
    superficialVelocityMPerS: velocity,
    viscosityPaS: viscosity,
    densityKgPerM3: density,
    voidFraction,
  } = state
  const drop =
    diameter === null || bedLength === null || velocity === null || viscosity === null || density === null
      ? null
      : ergunPressureDrop({
          particleDiameterM: diameter,
          bedVoidFraction: voidFraction.value,
          superficialVelocityMPerS: velocity,
          densityKgPerM3: density,
          viscosityPaS: viscosity,
          bedLengthM: bedLength.value,
        })
  // the viscous term goes with (1−ε)²/ε³: d ln = −(2/(1−ε) + 3/ε) dε
  const voidPower = (2 * voidFraction.value) / (1 - voidFraction.value) + 3
  return {
    id: 'pressure-drop',
    name: 'pressure drop over the bed',
    formula: 'n ΔP / p, ΔP by Ergun',
    source: 'Ergun, Chem. Eng. Prog. 48 (2) (1952) 89; limit common practice',
    mustBe: 'below',
    unit: '1',
    limit: REGIME_LIMITS.pressureDrop,
    value: drop === null ? null : (drop * Math.max(Math.abs(input.orderInKeyReactant ?? 1), 1)) / input.pressurePa,
    relative: [voidPower * voidFraction.relativeStandardUncertainty, bedLength?.relativeStandardUncertainty ?? 0, 0.1],
    assumed: [...voidFraction.assumed, ...(bedLength?.assumed ?? [])],
    missing: [
      ...missingDiameter(diameter),
      ...missingTube(input.loading.tubeInnerDiameterM),
      ...missingBed(state),
      ...missingGas(state),
    ],
  }
}

function dilutionDraft(input: RegimeInput, state: RegimeState): Draft {
  const diameter = input.loading.particleDiameterM
  const { diluentFraction, bedLength } = state
  return {
    id: 'dilution',
    name: 'uneven dilution of the bed',
    formula: '[b/(1−b)] X d_p / (2 L_b)',
    source: 'Berger, Pérez-Ramírez, Kapteijn and Moulijn, Chem. Eng. Sci. 57 (2002) 4921',
    mustBe: 'below',
    unit: '1',
    limit: REGIME_LIMITS.dilution,
    value:
      diameter === null || bedLength === null
        ? null
        : dilutionError(diluentFraction.value, Math.max(input.conversion, 0), diameter, bedLength.value),
    relative: [
      diluentFraction.value > 0 ? diluentFraction.relativeStandardUncertainty / (1 - diluentFraction.value) : 0,
      bedLength?.relativeStandardUncertainty ?? 0,
    ],
    assumed: [...diluentFraction.assumed, ...(bedLength?.assumed ?? [])],
    missing: [...missingDiameter(diameter), ...missingBed(state)],
  }
}

function spanDraft(input: RegimeInput): Draft {
  const energy = activationEnergy(input)
  const span = input.measuredBedSpanK ?? null
  return {
    id: 'bed-temperature-span',
    name: 'temperature span seen in the bed',
    formula: 'ΔT E / (R T²)',
    source: '5 % rule: Mears, J. Catal. 20 (1971) 127',
    mustBe: 'below',
    unit: '1',
    limit: REGIME_LIMITS.bedSpan,
    value:
      span === null
        ? null
        : (Math.abs(span) * energy.value) / (GAS_CONSTANT_J_PER_MOL_K * input.temperatureK * input.temperatureK),
    relative: [energy.relativeStandardUncertainty, 0.1],
    assumed: energy.assumed,
    missing: span === null ? ['measured temperatures along the bed'] : [],
  }
}

// Value against limit on a logarithmic scale, with the uncertainty of the value.
function judge(draft: Draft): RegimeCriterion {
  const { limit, relative, ...rest } = draft
  // impossible inputs, such as a composition beyond the feed, leave no value rather than a wrong one
  const value = draft.value !== null && Number.isFinite(draft.value) && draft.value >= 0 ? draft.value : null
  const log10StandardUncertainty =
    value === null ? null : Math.sqrt(relative.reduce((sum, u) => sum + u * u, 0)) / ln(10)
  const assumed = draft.assumed.filter(
    (entry, index, all) => all.findIndex(({ name }) => name === entry.name) === index,
  )
  const missing = value === null && draft.missing.length === 0 ? ['possible input'] : [...new Set(draft.missing)]
  const margin = value === null || limit === null ? null : marginOf(value, limit, draft.mustBe)
  const verdict = value === 0 && draft.mustBe === 'below' ? 'pass' : verdictOf(margin, log10StandardUncertainty)
  return {
    ...rest,
    assumed,
    missing,
    value,
    limit,
    margin,
    log10StandardUncertainty,
    verdict,
    sentence: sentenceOf({ ...draft, value }, verdict, assumed, missing),
  }
}

// Null for a value of zero that must be small: safe by any factor, and JSON has no infinity.
function marginOf(value: number, limit: number, mustBe: 'below' | 'above'): number | null {
  if (mustBe === 'above') return value / limit
  return value === 0 ? null : limit / value
}

function verdictOf(margin: number | null, log10StandardUncertainty: number | null): RegimeVerdict {
  if (margin === null || log10StandardUncertainty === null || !(margin > 0)) return 'cannot-tell'
  const distance = log10(margin)
  if (Math.abs(distance) < log10StandardUncertainty) return 'cannot-tell'
  return distance >= 0 ? 'pass' : 'fail'
}

function sentenceOf(
  draft: Draft,
  verdict: RegimeVerdict,
  assumed: readonly AssumedInput[],
  missing: readonly string[],
): string {
  const { value, limit } = draft
  if (value === null || limit === null) return `${capital(draft.name)}: cannot tell without ${missing.join(', ')}.`
  const bound = draft.mustBe === 'below' ? 'at most' : 'at least'
  const words = {
    pass: 'no effect to speak of',
    fail: 'likely to falsify the rate',
    'cannot-tell': 'too near the limit to tell',
  }
  const with_ =
    assumed.length === 0
      ? ''
      : ` Assumed: ${assumed.map((entry) => `${entry.name} ${formatNumber(entry.value, 3)} ${entry.unit === '1' ? '' : entry.unit}`.trim()).join(', ')}.`
  return `${capital(draft.name)}: ${formatNumber(value, 3)}, ${bound} ${formatNumber(limit, 3)} is wanted: ${words[verdict]}.${with_}`
}

function effectivenessOf(pore: Draft): RegimeReport['effectiveness'] {
  if (pore.value === null || !Number.isFinite(pore.value) || pore.value < 0) return null
  const factor = 1 + Math.sqrt(pore.relative.reduce((sum, u) => sum + u * u, 0))
  return {
    value: effectivenessFromObserved(pore.value).effectiveness,
    low: effectivenessFromObserved(pore.value * factor).effectiveness,
    high: effectivenessFromObserved(pore.value / factor).effectiveness,
  }
}

function activationEnergy(input: RegimeInput): RegimeQuantity {
  const { activationEnergy: usual } = REGIME_DEFAULTS
  return input.activationEnergyJPerMol === null
    ? { value: usual.value, relativeStandardUncertainty: usual.relativeStandardUncertainty, assumed: [usual] }
    : { value: input.activationEnergyJPerMol, relativeStandardUncertainty: 0.1, assumed: [] }
}

function orderAssumed(input: RegimeInput): readonly AssumedInput[] {
  if (input.orderInKeyReactant !== null) return []
  return [
    { name: 'order in the key reactant', value: 1, unit: '1', relativeStandardUncertainty: 0, source: 'first order' },
  ]
}

function solidShare(state: RegimeState): number {
  return (state.voidFraction.value / (1 - state.voidFraction.value)) * state.voidFraction.relativeStandardUncertainty
}

function missingRate(rate: object | null): string[] {
  return rate === null ? ['rate'] : []
}

function missingDiameter(diameter: number | null): string[] {
  return diameter === null ? ['particle diameter'] : []
}

function missingTube(tube: number | null): string[] {
  return tube === null ? ['tube diameter'] : []
}

function missingBed(state: RegimeState): string[] {
  return state.bedLength === null ? ['bed length or tube diameter'] : []
}

function missingKey(state: RegimeState): string[] {
  return state.keyConcentrationMolPerM3 > 0 ? [] : ['key reactant in the gas']
}

function missingDiffusivity(state: RegimeState): string[] {
  return state.molecularDiffusivity === null
    ? [`diffusion volume of ${state.unknownSpecies.join(', ') || 'another gas'}`]
    : []
}

function missingGas(state: RegimeState): string[] {
  return state.viscosityPaS === null ? [`viscosity of ${state.unknownSpecies.join(', ')}`] : []
}

function capital(text: string): string {
  return text.charAt(0).toUpperCase() + text.slice(1)
}
