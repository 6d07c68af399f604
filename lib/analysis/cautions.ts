import { type Caution, type CautionSeverity } from './caution'
import { numberText, probabilityText } from './number-text'

/** The numbers a caution speaks about. */
export interface CautionFacts {
  readonly value: number | null
  readonly limit: number | null
  /** further numbers or words for the sentence */
  readonly more?: Readonly<Record<string, number | string>>
  readonly holdNumber?: number | null
}

interface CautionKind {
  readonly severity: CautionSeverity
  readonly unit: string
  readonly source: string
  readonly tag: (facts: CautionFacts) => string
  readonly sentence: (facts: CautionFacts) => string
}

const percent = (value: number | null, digits = 2): string =>
  value === null ? 'not known' : `${numberText(value * 100, digits)} %`
const celsius = (value: number | string | undefined): string =>
  typeof value === 'number' ? `${numberText(value - 273.15, 4)} °C` : String(value ?? '')
const kilojoules = (value: number | string | undefined): string =>
  typeof value === 'number' ? `${numberText(value / 1000, 3)} kJ/mol` : String(value ?? '')
const minutes = (seconds: number | null): string => `${numberText(Math.abs(seconds ?? Number.NaN) / 60, 2)} min`
const number = (value: number | string | undefined): number => (typeof value === 'number' ? value : Number.NaN)
const word = (value: number | string | undefined): string => (value === undefined ? '' : String(value))

/**
 * Every doubt the engine can raise, in one place: code, weight, threshold's source, words. A grave caution keeps a run from counting until a
 * lead decides.
 */
export const CAUTIONS = {
  'line-bends': {
    severity: 'caution',
    unit: '-',
    source:
      'N. R. Draper, H. Smith, Applied Regression Analysis, 3rd edition, 1998, chapter 22; 1 % level: common practice',
    tag: ({ value }) => `line bends, p ${probabilityText(value ?? 1)}`,
    sentence: ({ value, more }) =>
      `The Arrhenius line bends: the activation energy is ${kilojoules(more?.cold)} at the cold end and ${kilojoules(more?.hot)} at the hot end (p ${probabilityText(value ?? 1)}). One straight line does not describe these points; look for pore diffusion, equilibrium or a change on stream.`,
  },
  'line-may-bend': {
    severity: 'note',
    unit: '-',
    source:
      'N. R. Draper, H. Smith, Applied Regression Analysis, 3rd edition, 1998, chapter 22; 5 % level: common practice',
    tag: ({ value }) => `may bend, p ${probabilityText(value ?? 1)}`,
    sentence: ({ value, more }) =>
      `The Arrhenius line may bend: ${kilojoules(more?.cold)} at the cold end, ${kilojoules(more?.hot)} at the hot end (p ${probabilityText(value ?? 1)}; one straight line in twenty looks like this by chance).`,
  },
  'few-temperatures': {
    severity: 'caution',
    unit: '-',
    source: 'common practice: at least five steady temperatures',
    tag: ({ value }) => `${numberText(value ?? 0, 2)} temperatures`,
    sentence: ({ value, limit }) =>
      `The line rests on ${numberText(value ?? 0, 2)} distinct temperatures; ${numberText(limit ?? 0, 2)} or more are wanted.`,
  },
  'too-few-temperatures': {
    severity: 'grave',
    unit: '-',
    source: 'common practice: at least three temperatures for any uncertainty',
    tag: ({ value }) => `only ${numberText(value ?? 0, 1)} temperatures`,
    sentence: ({ value }) =>
      `The line rests on only ${numberText(value ?? 0, 1)} distinct temperatures, so nothing can be said about how far it may be wrong.`,
  },
  'small-span': {
    severity: 'caution',
    unit: 'K-1',
    source: 'common practice: 1.5e-4 K-1 in 1/T, or a tenfold change of the rate',
    tag: ({ more }) => `span only ${numberText(number(more?.spanK), 2)} K`,
    sentence: ({ more }) =>
      `The temperatures span only ${numberText(number(more?.spanK), 2)} K and the rate changes ${numberText(number(more?.ratio), 2)}-fold; about 40 K or a tenfold change is wanted for an activation energy.`,
  },
  'reference-extrapolated': {
    severity: 'caution',
    unit: 'K',
    source: 'common practice: no more than a tenth of the range in 1/T outside the data',
    tag: ({ value }) => `${celsius(value ?? Number.NaN)} is extrapolated`,
    sentence: ({ value, more }) =>
      `The reference temperature ${celsius(value ?? Number.NaN)} lies outside the measured range ${celsius(more?.low)} to ${celsius(more?.high)} by more than a tenth of it in 1/T.`,
  },
  'outlying-point': {
    severity: 'note',
    unit: '-',
    source: 'R. D. Cook, S. Weisberg, Residuals and Influence in Regression, 1982, section 2.2 (Bonferroni, 5 %)',
    tag: () => 'outlying point',
    sentence: ({ value, limit, holdNumber }) =>
      `Hold ${word(holdNumber ?? undefined)} lies off the line: studentised residual ${numberText(value ?? 0, 3)}, limit ${numberText(limit ?? 0, 3)}. It is kept in the line.`,
  },
  'pulling-point': {
    severity: 'note',
    unit: '-',
    source: 'R. D. Cook, S. Weisberg, Residuals and Influence in Regression, 1982, section 3.5 (distance above 1)',
    tag: () => 'one point pulls',
    sentence: ({ value, holdNumber }) =>
      `Hold ${word(holdNumber ?? undefined)} alone moves the line: Cook's distance ${numberText(value ?? 0, 2)}, above 1.`,
  },
  'scatter-between-holds': {
    severity: 'note',
    unit: '-',
    source: 'T. A. Bancroft, Biometrics 20 (1964) 427, doi:10.2307/2528486 (preliminary test at 25 %)',
    tag: ({ value }) => `holds scatter ${percent(value)}`,
    sentence: ({ value, more }) =>
      `The points scatter about the line more than their injections explain (${percent(number(more?.injections))} a hold): ${percent(value)} between holds was added to every point.`,
  },
  deactivation: {
    severity: 'caution',
    unit: '-',
    source: 'common practice: a returned hold within 3 % and within twice its uncertainty',
    tag: ({ value }) =>
      (value ?? 1) < 1
        ? `lost ${percent(1 - (value ?? 1))} on stream`
        : `gained ${percent((value ?? 1) - 1)} on stream`,
    sentence: ({ value, limit, more }) =>
      `Back at ${celsius(more?.temperatureK)}, the rate was ${percent(Math.abs(1 - (value ?? 1)), 3)} ${(value ?? 1) < 1 ? 'lower' : 'higher'} than before (limit ${percent(limit)}), ${numberText(Math.abs(number(more?.lossPerH)) * 100, 2)} % an hour: temperature and time are mixed in this line.${word(more?.corrected)}`,
  },
  'strong-deactivation': {
    severity: 'grave',
    unit: '-',
    source: 'common practice: 20 % change of the returned hold',
    tag: ({ value }) => `changed ${percent(Math.abs(1 - (value ?? 1)))} on stream`,
    sentence: ({ value, limit, more }) =>
      `Back at ${celsius(more?.temperatureK)}, the rate was ${percent(Math.abs(1 - (value ?? 1)), 3)} ${(value ?? 1) < 1 ? 'lower' : 'higher'} than before, beyond ${percent(limit)}: the line says little about the fresh catalyst.${word(more?.corrected)}`,
  },
  'injections-outside-log': {
    severity: 'caution',
    unit: '-',
    source: 'common practice',
    tag: ({ more }) => `${word(more?.count)} injections outside the log`,
    sentence: ({ more }) =>
      `${word(more?.count)} of ${word(more?.all)} injections were taken before the rig log begins or after it ends: nothing says what the reactor was doing then. Is the file of another day or run, or is a clock wrong?`,
  },
  'clocks-disagree': {
    severity: 'caution',
    unit: 's',
    source: 'common practice (cross-correlation of a by-pass step)',
    tag: ({ value }) => `clock off by ${minutes(value)}`,
    sentence: ({ value, more }) =>
      `By the turning of the bypass valve the analyser’s clock is ${minutes(value)} ${(value ?? 0) > 0 ? 'behind' : 'ahead of'} the rig’s (anything from ${minutes(number(more?.low))} to ${minutes(number(more?.high))} fits as well): ${word(more?.agreeing)} of ${word(more?.compared)} injections would then agree with the valve, as the clocks are set ${word(more?.asSet)} do. Injections may stand in the wrong hold until the clock is set.`,
  },
  'carbon-balance': {
    severity: 'caution',
    unit: '-',
    source: 'common practice: carbon balance within the window set by the method, or within twice its uncertainty',
    tag: ({ value }) => `carbon ${numberText((value ?? 0) * 100, 3)} %`,
    sentence: ({ value, limit }) =>
      `The mean carbon balance is ${numberText(value ?? 0, 3)}, outside ${numberText(1 - (limit ?? 0), 3)} to ${numberText(1 + (limit ?? 0), 3)}: carbon is missing or counted twice, so the run does not count until a lead decides.`,
  },
  'carbon-balance-far-off': {
    severity: 'grave',
    unit: '-',
    source: 'common practice: carbon balance within 10 %',
    tag: ({ value }) => `carbon ${numberText((value ?? 0) * 100, 3)} %`,
    sentence: ({ value, limit }) =>
      `The mean carbon balance is ${numberText(value ?? 0, 3)}, far outside ${numberText(1 - (limit ?? 0), 3)} to ${numberText(1 + (limit ?? 0), 3)}: no rate of this run can be trusted.`,
  },
  'hold-carbon-balance': {
    severity: 'caution',
    unit: '-',
    source: 'common practice: carbon balance within the window set by the method, or within twice its uncertainty',
    tag: ({ value }) => `carbon ${numberText((value ?? 0) * 100, 3)} %`,
    sentence: ({ value, limit, holdNumber }) =>
      `The carbon balance at hold ${word(holdNumber ?? undefined)} is ${numberText(value ?? 0, 3)}, outside ${numberText(1 - (limit ?? 0), 3)} to ${numberText(1 + (limit ?? 0), 3)}.`,
  },
  'steady-state-unknown': {
    severity: 'note',
    unit: '1/h',
    source:
      'S. Wellek, Testing Statistical Hypotheses of Equivalence and Noninferiority, 2nd edition, 2010 (90 % interval inside the limits)',
    tag: () => 'steadiness cannot be told',
    sentence: ({ limit, holdNumber, more }) =>
      `At hold ${word(holdNumber ?? undefined)} the drift lies between ${percent(number(more?.low))} and ${percent(number(more?.high))} an hour (90 %): too wide to say that it is within ${percent(limit)} an hour.`,
  },
  drifting: {
    severity: 'caution',
    unit: '1/h',
    source:
      'S. Wellek, Testing Statistical Hypotheses of Equivalence and Noninferiority, 2nd edition, 2010 (90 % interval outside the limits)',
    tag: ({ value }) => `drifts ${percent(value)} an hour`,
    sentence: ({ value, limit, holdNumber }) =>
      `Hold ${word(holdNumber ?? undefined)} drifts by ${percent(value)} an hour, beyond ${percent(limit)} an hour.`,
  },
  'conversion-high': {
    severity: 'caution',
    unit: '-',
    source: "set by the campaign's method",
    tag: ({ value }) => `conversion ${percent(value, 3)}`,
    sentence: ({ value, limit, holdNumber }) =>
      `The conversion at hold ${word(holdNumber ?? undefined)} is ${percent(value, 3)}, above the method's limit of ${percent(limit, 3)}: the rate leans on the rate law.`,
  },
  'near-equilibrium': {
    severity: 'caution',
    unit: '-',
    source: 'common practice: approach to equilibrium below 0.05 needs no correction',
    tag: ({ value }) => `η ${numberText(value ?? 0, 2)}`,
    sentence: ({ value, limit, holdNumber }) =>
      `At hold ${word(holdNumber ?? undefined)} the gas leaves at ${numberText(value ?? 0, 2)} of equilibrium (limit ${numberText(limit ?? 0, 2)}): the reverse reaction matters.`,
  },
  'at-equilibrium': {
    severity: 'grave',
    unit: '-',
    source: 'common practice: above 0.8 of equilibrium no kinetics can be seen',
    tag: ({ value }) => `η ${numberText(value ?? 0, 2)}`,
    sentence: ({ value, limit, holdNumber }) =>
      `At hold ${word(holdNumber ?? undefined)} the gas leaves at ${numberText(value ?? 0, 2)} of equilibrium, above ${numberText(limit ?? 0, 2)}: the rate is not kinetic and the point is kept out of the line.`,
  },
  'routes-disagree': {
    severity: 'note',
    unit: '-',
    source: 'common practice: two routes within twice the uncertainty of their difference',
    tag: ({ value }) => `routes differ, z ${numberText(value ?? 0, 2)}`,
    sentence: ({ value, holdNumber, more }) =>
      `At hold ${word(holdNumber ?? undefined)} the reactant says ${percent(number(more?.reactant))} and the products say ${percent(number(more?.products))} conversion: they differ by ${numberText(Math.abs(value ?? 0), 2)} times the uncertainty of the difference.`,
  },
  'bypass-drift': {
    severity: 'caution',
    unit: '-',
    source: 'common practice: feed analysis within 2 %',
    tag: ({ value }) => `feed drifted ${percent(value)}`,
    sentence: ({ value, limit }) =>
      `The feed analysis through the bypass changed by ${percent(value)} between its first and last half (limit ${percent(limit)}).`,
  },
  'no-bypass': {
    severity: 'note',
    unit: '-',
    source: 'common practice',
    tag: () => 'feed from controllers',
    sentence: () =>
      'No injection through the bypass could be used, so the feed composition comes from the flow controllers.',
  },
  'below-detection': {
    severity: 'note',
    unit: '-',
    source: 'common practice',
    tag: ({ more }) => `${word(more?.species)} not seen`,
    sentence: ({ holdNumber, value, more }) =>
      `At hold ${word(holdNumber ?? undefined)}, ${word(more?.species)} was below detection in ${numberText(value ?? 0, 3)} of ${word(more?.count)} injections and was left out of the means there.`,
  },
  'nothing-converted': {
    severity: 'note',
    unit: '-',
    source: 'common practice: a logarithm needs a value above three times its uncertainty',
    tag: () => 'nothing converted',
    sentence: ({ holdNumber }) =>
      `At hold ${word(holdNumber ?? undefined)} no product was seen above three times its uncertainty: the rate cannot go into a logarithm and the point is kept out of the line.`,
  },
  'pore-diffusion-likely': {
    severity: 'caution',
    unit: '-',
    source: 'P. B. Weisz, C. D. Prater, Adv. Catal. 6 (1954) 143, doi:10.1016/S0360-0564(08)60390-9',
    tag: ({ value }) => `pore diffusion, Φ ${numberText(value ?? 0, 2)}`,
    sentence: ({ value, limit, holdNumber, more }) =>
      `At hold ${word(holdNumber ?? undefined)} the Weisz-Prater number is ${numberText(value ?? 0, 2)} (limit ${numberText(limit ?? 0, 2)}): the gas inside the particles is poorer than outside, and the rate is not the chemistry's alone.${word(more?.assumed)}`,
  },
  'blank-share': {
    severity: 'caution',
    unit: '-',
    source: 'common practice: blank below 5 % of the signal',
    tag: ({ value }) => `blank ${percent(value)}`,
    sentence: ({ value, limit }) => `The blank makes up to ${percent(value)} of the rate (limit ${percent(limit)}).`,
  },
  'no-site-count': {
    severity: 'caution',
    unit: '-',
    source: 'common practice',
    tag: () => 'no site count',
    sentence: () =>
      'No site count is recorded for this sample, so that it has no turnover frequency and no place in a ranking by it. Add a site count to the sample, or rank by the rate per mass.',
  },
  'few-injections': {
    severity: 'caution',
    unit: '-',
    source: 'common practice: at least three injections a hold',
    tag: ({ value }) => `${numberText(value ?? 0, 2)} injections`,
    sentence: ({ value, limit, holdNumber }) =>
      `Hold ${word(holdNumber ?? undefined)} rests on ${numberText(value ?? 0, 2)} injections; ${numberText(limit ?? 0, 2)} or more are wanted.`,
  },
} as const satisfies Readonly<Record<string, CautionKind>>

export type CautionCode = keyof typeof CAUTIONS

/** Not grave, yet it keeps a run from counting until a lead has decided: the number may be right, but somebody must have looked. */
const HOLDS_BACK: readonly string[] = ['carbon-balance'] satisfies readonly CautionCode[]

/**
 * Whether a run with these cautions may count without a lead's decision.
 *
 * @param cautions - all cautions of the run, its points and its line [-]
 * @returns false while a grave caution or a carbon balance outside its window stands [-]
 */
export function mayCountWith(cautions: readonly Caution[]): boolean {
  return cautions.every((caution) => caution.severity !== 'grave' && !HOLDS_BACK.includes(caution.code))
}

/**
 * A caution of the catalogue with its numbers put in.
 *
 * @param code - which one [-]
 * @param facts - value, limit and further numbers for the sentence [unit stated in the catalogue]
 * @returns the caution [-]
 */
export function raiseCaution(code: CautionCode, facts: CautionFacts): Caution {
  const kind: CautionKind = CAUTIONS[code]
  return {
    code,
    severity: kind.severity,
    tag: kind.tag(facts),
    sentence: kind.sentence(facts),
    value: facts.value,
    limit: facts.limit,
    unit: kind.unit,
    source: kind.source,
    holdNumber: facts.holdNumber ?? null,
  }
}
