import { z } from 'zod'
import { type Caution } from '@/lib/analysis/caution'
import { type Estimate, type SharedSource } from '@/lib/analysis/estimate'
import { type ArrheniusFit, type Point, type RunReduction } from '@/lib/analysis/reduction/run-reduction'
import { type Working } from '@/lib/analysis/working'
import { detectionSchema, problemSchema, questionSchema, uploadStates, type Upload } from '@/lib/domain/intake'
import { type Edition, type EditionProposal, type EditionSummary } from '@/lib/domain/edition'
import { methodSettingsSchema } from '@/lib/domain/method'
import { type Ranking, type RankingRow } from '@/lib/domain/ranking'
import { runDecisions, runStates } from '@/lib/domain/run'
import { type RunResult } from '@/lib/domain/run-result'
import { instantSchema } from '@/lib/domain/text'
import { type UploadPreview } from '@/lib/domain/upload-preview'
import { runRecord } from './_records'

// What the API answers of files and of what is computed from them, held to the types of the analysis by the compiler.

const text = z.string()
const number = z.number()
const count = z.int().gte(0)
const numberOrNull = number.nullable()
const interval = z.tuple([number, number]).nullable()

const estimate = z.strictObject({
  value: number,
  randomStandardUncertainty: numberOrNull,
  degreesOfFreedom: numberOrNull,
  sharedEffects: z.record(text, number),
}) satisfies z.ZodType<Estimate>
const estimateOrNull = estimate.nullable()

const sharedSource = z.strictObject({
  id: text,
  kind: z.enum([
    'flow',
    'mass',
    'response-factor',
    'site-count',
    'thermocouple',
    'pressure',
    'particle',
    'thermochemistry',
    'inlet',
  ]),
  label: text,
  standardUncertainty: number,
  unit: text,
}) satisfies z.ZodType<SharedSource>

const caution = z.strictObject({
  code: text,
  severity: z.enum(['note', 'caution', 'grave']),
  tag: text,
  sentence: text,
  value: numberOrNull,
  limit: numberOrNull,
  unit: text,
  source: text,
  holdNumber: numberOrNull,
}) satisfies z.ZodType<Caution>

const workingSymbol = z.strictObject({
  symbol: text,
  meaning: text,
  value: numberOrNull,
  unit: text,
  standardUncertainty: numberOrNull,
  uncertaintyKind: z.enum(['own', 'shared', 'both', 'none']),
})
const working = z.strictObject({
  title: text,
  formula: text,
  symbols: z.array(workingSymbol),
  result: workingSymbol,
  assumptions: z.array(text),
  source: text,
  from: z.array(text),
  leftOut: z.array(text),
  notes: z.array(text),
}) satisfies z.ZodType<Working>
const workings = z.record(text, working)

const hold = z.strictObject({
  number: count,
  kind: z.enum(['reactor', 'bypass']),
  foundStartS: number,
  startS: number,
  endS: number,
  setTemperatureK: number,
  returnsTo: numberOrNull,
  isEdited: z.boolean(),
})

const injection = z.strictObject({
  number,
  timeS: number,
  sourceRow: number,
  use: z.enum(['point', 'inlet', 'left-out', 'unassigned']),
  holdNumber: numberOrNull,
  conversion: numberOrNull,
  reason: text,
})

const point = z.strictObject({
  hold,
  temperatureK: estimate,
  timeOnStreamS: number,
  inletPressurePa: numberOrNull,
  meanPressurePa: number,
  totalFlowMolPerS: number,
  keyFlowMolPerS: estimate,
  inletMoleFraction: z.record(text, number),
  conversionByProducts: estimateOrNull,
  conversionByReactant: estimateOrNull,
  conversion: estimateOrNull,
  conversionRoute: z.enum(['products', 'reactant', 'combined', 'none']),
  routeConsistencyZ: numberOrNull,
  carbonSelectivity: z.record(text, estimate),
  carbonBalance: estimateOrNull,
  meanRateMolPerKgS: estimateOrNull,
  rateMolPerKgS: estimateOrNull,
  turnoverFrequencyPerS: estimateOrNull,
  approachToEquilibrium: numberOrNull,
  steadyState: z.strictObject({
    answer: z.enum(['steady', 'drifting', 'cannot-tell']),
    driftPerH: numberOrNull,
    lowPerH: numberOrNull,
    highPerH: numberOrNull,
  }),
  injectionsUsed: z.array(number),
  injectionsInHold: count,
  excluded: z.strictObject({ by: text, reason: text }).nullable(),
  cautions: z.array(caution),
  workings,
}) satisfies z.ZodType<Point>

const fit = z.strictObject({
  quantity: z.enum(['rate', 'turnover-frequency']),
  runCodes: z.array(text),
  activationEnergyJPerMol: estimate,
  lnPreExponential: estimate,
  centreTemperatureK: number,
  lnRateAtCentre: estimate,
  lnRateAtReference: estimate,
  referenceTemperatureK: number,
  isReferenceExtrapolated: z.boolean(),
  covarianceLnAEa: numberOrNull,
  confidenceLevel: number,
  intervals: z.strictObject({
    activationEnergyJPerMol: interval,
    lnPreExponential: interval,
    lnRateAtReference: interval,
  }),
  residualStandardDeviation: numberOrNull,
  betweenHoldStandardDeviation: numberOrNull,
  chiSquared: numberOrNull,
  degreesOfFreedom: number,
  distinctTemperatures: count,
  lowestTemperatureK: number,
  highestTemperatureK: number,
  curvature: z
    .strictObject({
      pValue: number,
      activationEnergyColdJPerMol: number,
      activationEnergyHotJPerMol: number,
    })
    .nullable(),
  points: z.array(
    z.strictObject({
      holdNumber: count,
      runCode: text,
      temperatureK: number,
      lnRate: number,
      lnRateStandardUncertainty: number,
      fitted: number,
      residual: number,
      leverage: numberOrNull,
      studentisedResidual: numberOrNull,
      cookDistance: numberOrNull,
      isUsed: z.boolean(),
      reason: text,
    }),
  ),
  cautions: z.array(caution),
  workings,
}) satisfies z.ZodType<ArrheniusFit>

const reduction = z.strictObject({
  runCode: text,
  holds: z.array(hold),
  injections: z.array(injection),
  points: z.array(point),
  fit: fit.nullable(),
  fitWithAllPoints: fit.nullable(),
  noFitReason: text,
  returnedHold: z.strictObject({ holdNumber: count, returnsTo: count, ratio: estimate, lossPerH: number }).nullable(),
  meanCarbonBalance: numberOrNull,
  clockOffset: z
    .strictObject({
      offsetS: number,
      lowS: number,
      highS: number,
      agreeing: count,
      agreeingAsSet: count,
      compared: count,
    })
    .nullable(),
  sharedSources: z.array(sharedSource),
  cautions: z.array(caution),
  mayCount: z.boolean(),
}) satisfies z.ZodType<RunReduction>

export const uploadRecord = z.strictObject({
  id: text,
  campaignId: text,
  runId: text,
  sha256: text,
  byteCount: count,
  fileName: text,
  state: z.enum(uploadStates),
  kind: z.enum(['rig-log', 'analyser', 'attachment']).nullable(),
  detection: detectionSchema.nullable(),
  problems: z.array(problemSchema),
  failure: text.nullable(),
  columnMapId: text.nullable(),
  createdByName: text,
  createdAt: instantSchema,
  confirmedAt: instantSchema.nullable(),
  version: z.int().gte(1),
}) satisfies z.ZodType<Upload>

/** A file as it was added: new, or there already with these very bytes. */
export const addedUploadRecord = uploadRecord.extend({ isNew: z.boolean() })

export const previewRecord = z.strictObject({
  rowCount: count,
  problems: z.array(problemSchema),
  questions: z.array(questionSchema),
  channels: z.array(
    z.strictObject({
      name: text,
      unit: text,
      timeS: z.array(number),
      values: z.array(numberOrNull),
      minimum: numberOrNull,
      maximum: numberOrNull,
      missingCount: count,
    }),
  ),
}) satisfies z.ZodType<UploadPreview>

export const runResultRecord = z.strictObject({
  run: runRecord,
  uploads: z.array(uploadRecord),
  reduction: reduction.nullable(),
  notReadyReason: text,
  trace: z
    .strictObject({
      timeS: z.array(number),
      bedTemperatureK: z.array(numberOrNull),
      setTemperatureK: z.array(numberOrNull).nullable(),
    })
    .nullable(),
}) satisfies z.ZodType<RunResult>

export const runPointsRecord = z.strictObject({
  runId: text,
  runCode: text,
  notReadyReason: text,
  points: z.array(point),
  fit: fit.nullable(),
  noFitReason: text,
  cautions: z.array(caution),
  sharedSources: z.array(sharedSource),
})

const rankingRow = z.strictObject({
  sampleId: text,
  sampleCode: text,
  sampleName: text,
  kind: z.enum(['catalyst', 'blank']),
  runs: z.array(
    z.strictObject({
      runId: text,
      code: text,
      state: z.enum(runStates),
      decision: z.enum(runDecisions).nullable(),
      isIncluded: z.boolean(),
      reason: text,
    }),
  ),
  rank: numberOrNull,
  rankInterval: interval,
  probabilityBest: numberOrNull,
  activationEnergyJPerMol: estimateOrNull,
  activationEnergyInterval: interval,
  lnPreExponential: estimateOrNull,
  lnPreExponentialInterval: interval,
  rateMolPerKgS: estimateOrNull,
  rateInterval: interval,
  turnoverFrequencyPerS: estimateOrNull,
  turnoverFrequencyInterval: interval,
  temperatureForConversionK: estimateOrNull,
  temperatureForConversionInterval: interval,
  selectivity: z.record(text, estimate),
  selectivityIntervals: z.record(text, interval),
  carbonBalance: estimateOrNull,
  carbonBalanceInterval: interval,
  decayPerH: estimateOrNull,
  decayInterval: interval,
  cannotTell: z.record(text, text),
  distinctTemperatures: count,
  lowestTemperatureK: numberOrNull,
  highestTemperatureK: numberOrNull,
  cautions: z.array(caution),
  isProvisional: z.boolean(),
  isShortlisted: z.boolean(),
  priority: numberOrNull,
  remark: text,
  version: z.int().gte(1),
  fit: fit.nullable(),
  runFits: z.array(fit),
  workings,
}) satisfies z.ZodType<RankingRow>

const frozenRanking = z.strictObject({
  campaignId: text,
  campaignCode: text,
  campaignName: text,
  methodId: text,
  methodNumber: z.int().gte(1),
  rankedBy: z.enum(['turnover-frequency', 'rate']),
  referenceTemperatureK: number,
  methodReferenceTemperatureK: number.exactOptional(),
  targetConversion: number.exactOptional(),
  confidenceLevel: number,
  draws: count,
  seed: number,
  engineId: text,
  includesProvisional: z.boolean(),
  rows: z.array(rankingRow),
  holdTemperaturesK: z.array(number),
  summary: text,
})
export const rankingRecord = frozenRanking.extend({ computedAt: instantSchema }) satisfies z.ZodType<Ranking>

const editionRun = z.strictObject({
  runId: text,
  runCode: text,
  sampleCode: text,
  reductionKey: text,
  decision: z.enum(runDecisions),
  decisionReason: text,
  files: z.array(z.strictObject({ fileName: text, sha256: text, byteCount: count })),
})

export const editionSummaryRecord = z.strictObject({
  id: text,
  campaignId: text,
  number: z.int().gte(1),
  methodNumber: z.int().gte(1),
  engineId: text,
  contentSha256: text,
  statement: text,
  publishedByName: text,
  publishedAt: instantSchema,
  withdrawnAt: instantSchema.nullable(),
  withdrawnByName: text.nullable(),
  withdrawnReason: text.nullable(),
  runCount: count,
}) satisfies z.ZodType<EditionSummary>
export const listedEditionRecord = editionSummaryRecord.extend({ campaignCode: text, campaignName: text })

export const editionRecord = editionSummaryRecord.extend({
  content: z.strictObject({
    format: z.literal(1),
    laboratory: text,
    methodSettings: methodSettingsSchema,
    ranking: frozenRanking,
    runs: z.array(editionRun),
  }),
  isIntact: z.boolean(),
}) satisfies z.ZodType<Edition>

export const editionProposalRecord = z.strictObject({
  number: z.int().gte(1),
  contentSha256: text,
  ranking: frozenRanking,
  runs: z.array(editionRun),
  leftOut: z.array(z.strictObject({ runCode: text, sampleCode: text, reason: text })),
  refusal: text,
}) satisfies z.ZodType<EditionProposal>
