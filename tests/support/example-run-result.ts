import { type Caution } from '@/lib/analysis/caution'
import { type Hold, type InjectionUse, type Point, type RunReduction } from '@/lib/analysis/reduction/run-reduction'
import { type Upload } from '@/lib/domain/intake'
import { type Run } from '@/lib/domain/run'
import { type RunResult } from '@/lib/domain/run-result'
import { estimateOf, exampleFit } from './example-fit'

const START = Date.parse('2026-03-09T06:30:00Z') / 1000
const SETS_C = [215, 225, 235, 245, 255, 265, 275, 245]
const CONVERSIONS = [0.00543, 0.008, 0.01163, 0.01661, 0.02334, 0.03262, 0.0446, 0.01433]
const MASS_KG = 75.5e-6
const FEED = 5.354e-6

const decay: Caution = {
  code: 'decay',
  severity: 'caution',
  tag: 'decays 3.5 % h⁻¹',
  sentence: 'Hold 8 returns to 245 °C and is 13.7 % below hold 4, 4.2 h later: about 3.5 % an hour.',
  value: 0.137,
  limit: 0.03,
  unit: '1',
  source: 'common practice',
  holdNumber: 8,
}

const run: Run = {
  id: 'run-8',
  code: 'R-0008',
  campaignId: 'campaign-1',
  campaignCode: 'MET-1',
  sampleId: 'sample-CQ-107',
  sampleCode: 'CQ-107',
  sampleName: '5 wt% Ni on silica, lot 2',
  rigId: 'rig-b',
  rigCode: 'Rig B',
  channel: '1',
  loadingId: 'loading-8',
  loadingCode: 'L-0008',
  kind: 'catalyst',
  state: 'open',
  decision: null,
  startedAt: '2026-03-09T07:30:00+01:00',
  createdBy: 'user-1',
  createdByName: 'T. Quay',
  version: 3,
  fileCount: 2,
  isFrozen: false,
  loading: {
    id: 'loading-8',
    code: 'L-0008',
    rigId: 'rig-b',
    channel: '1',
    sampleId: 'sample-CQ-107',
    lotId: null,
    sampleCode: 'CQ-107',
    lotCode: null,
    packedAt: null,
    version: 1,
    catalystMassKg: MASS_KG,
    massRelativeStandardUncertainty: 0.003,
    diluentMassKg: 450e-6,
    diluentMaterial: 'SiC',
    particleMinimumM: 125e-6,
    particleMaximumM: 180e-6,
    tubeInnerDiameterM: 0.0046,
    bedLengthM: 0.02,
  },
  feed: [],
  pressurePa: 130_000,
  pressureKind: 'absolute',
  barometerPa: null,
  pressureText: '1,3 bar',
  pretreatment: 'H₂, 400 °C, 2 h',
  notes: '',
  clockOffsetS: 0,
  decisionReason: null,
}

const upload = (id: string, fileName: string, kind: Upload['kind'], rowCount: number): Upload => ({
  id,
  campaignId: 'campaign-1',
  runId: 'run-8',
  sha256: '0'.repeat(64),
  byteCount: 310_590,
  fileName,
  state: 'confirmed',
  kind,
  detection: {
    format: 'delimited-text',
    dialect: 'comma-separated, decimal point',
    encoding: 'utf-8',
    preamble: [],
    tableName: '',
    headers: [],
    rowCount,
    firstRows: [],
    fingerprint: '',
    proposal: {
      kind: kind ?? 'attachment',
      shape: 'wide',
      sheet: '',
      columns: [],
      decimalMark: '.',
      dateOrder: null,
      timeZone: 'UTC',
      elapsedStart: null,
      bypassWords: ['bypass'],
      basis: null,
      barometerPa: null,
      ambiguousHour: null,
    },
    columnMapId: null,
    questions: [],
    facts: {
      isKindOpen: false,
      isDateOrderOpen: false,
      dateOrderProposal: 'day-first',
      dateOrderReason: '',
      dateExample: '',
      isDecimalMarkOpen: false,
      decimalExample: '',
      statedStart: null,
      needsStart: false,
      hasOffsets: false,
      hasAmbiguousHour: false,
    },
  },
  problems: [],
  failure: null,
  columnMapId: 'map-1',
  createdByName: 'T. Quay',
  createdAt: '2026-03-09T17:00:00Z',
  confirmedAt: '2026-03-09T17:01:00Z',
  version: 2,
})

/** The decaying run of the drawings, invented, for tests of what is drawn. */
export function exampleRunResult(): RunResult {
  const holds: Hold[] = [
    {
      number: 1,
      kind: 'bypass',
      foundStartS: START,
      startS: START,
      endS: START + 5_400,
      setTemperatureK: 488.15,
      returnsTo: null,
      isEdited: false,
    },
  ]
  const injections: InjectionUse[] = []
  const points: Point[] = []
  let clock = START + 5_400
  SETS_C.forEach((setC, index) => {
    const startS = clock + 1_500
    const endS = clock + 4_200
    const conversion = CONVERSIONS[index] ?? 0
    const hold: Hold = {
      number: index + 1,
      kind: 'reactor',
      foundStartS: startS - 600,
      startS,
      endS,
      setTemperatureK: setC + 273.15,
      returnsTo: index === 7 ? 4 : null,
      isEdited: false,
    }
    holds.push(hold)
    for (let k = 0; k < 5; k += 1) {
      injections.push({
        number: index * 5 + k + 6,
        timeS: startS - 300 + k * 720,
        sourceRow: index * 5 + k + 7,
        use: k === 0 ? 'left-out' : 'point',
        holdNumber: index + 1,
        conversion: conversion * (1.02 - 0.007 * k),
        reason: k === 0 ? 'first injection after the ramp' : '',
      })
    }
    const rate = (conversion * FEED) / MASS_KG
    points.push({
      hold,
      temperatureK: estimateOf(setC + 273.13, 0.03, { 'thermocouple:rig-b': 0.4 }),
      timeOnStreamS: startS - START + 1_200,
      inletPressurePa: 130_000,
      meanPressurePa: 129_500,
      totalFlowMolPerS: 44.6e-6,
      keyFlowMolPerS: estimateOf(FEED, FEED * 0.001, { 'flow:rig-b': FEED * 0.008 }),
      inletMoleFraction: { CO2: 0.12, H2: 0.6, Ar: 0.08, N2: 0.2 },
      conversionByProducts: estimateOf(conversion, conversion * 0.006),
      conversionByReactant: estimateOf(conversion * 1.04, 0.0054),
      conversion: estimateOf(conversion, conversion * 0.006),
      conversionRoute: 'products',
      routeConsistencyZ: 0.1,
      carbonSelectivity: { CH4: estimateOf(0.959 - index * 0.0025, 0.001) },
      carbonBalance: estimateOf(1.001, 0.005),
      meanRateMolPerKgS: estimateOf(rate, rate * 0.006),
      rateMolPerKgS: estimateOf(rate, rate * 0.006, { 'flow:rig-b': -rate * 0.008, 'mass:loading-8': -rate * 0.003 }),
      turnoverFrequencyPerS: estimateOf(rate / 0.06, (rate / 0.06) * 0.006, { 'sites:CQ-107': -(rate / 0.06) * 0.08 }),
      approachToEquilibrium: 1e-6,
      steadyState: { answer: 'steady', driftPerH: 0.002, lowPerH: -0.01, highPerH: 0.013 },
      injectionsUsed: [0, 1, 2, 3].map((k) => index * 5 + k + 7),
      injectionsInHold: 5,
      excluded: index === 7 ? { by: 'rule', reason: 'returns to hold 4' } : null,
      cautions: index === 7 ? [{ ...decay, tag: '−14 % against hold 4' }] : [],
      workings: {
        rateMolPerKgS: {
          title: `Rate at hold ${index + 1}`,
          formula: 'r = F_A0 · X / W',
          symbols: [
            {
              symbol: 'F_A0',
              meaning: 'carbon dioxide fed',
              value: 5.354,
              unit: 'µmol s⁻¹',
              standardUncertainty: 0.043,
              uncertaintyKind: 'shared',
            },
            {
              symbol: 'X',
              meaning: 'from CH₄ and CO formed',
              value: conversion,
              unit: '',
              standardUncertainty: conversion * 0.006,
              uncertaintyKind: 'own',
            },
            {
              symbol: 'W',
              meaning: 'catalyst',
              value: 75.5,
              unit: 'mg',
              standardUncertainty: 0.23,
              uncertaintyKind: 'shared',
            },
          ],
          result: {
            symbol: 'r',
            meaning: 'rate',
            value: rate * 1000,
            unit: 'µmol g⁻¹ s⁻¹',
            standardUncertainty: rate * 6,
            uncertaintyKind: 'own',
          },
          assumptions: ['Differential bed, X ≤ 0.10, assigned to the mean composition.'],
          source: 'Levenspiel, Chemical Reaction Engineering, 3rd ed., ch. 18',
          from: ['R-0008 analyser file, rows 172 to 195'],
          leftOut: ['two injections after the ramp, by rule'],
          notes: ['The product route is 54 times sharper here.'],
        },
      },
    })
    clock = endS
  })
  const timeS: number[] = []
  const bedTemperatureK: number[] = []
  const setTemperatureK: number[] = []
  for (let second = 0; second < clock - START; second += 60) {
    const at = START + second
    const index = Math.max(0, Math.min(7, Math.floor((second - 5_400) / 4_200)))
    const set = (SETS_C[index] ?? 215) + 273.15
    timeS.push(at)
    setTemperatureK.push(set)
    const previous = second < 2_000 ? 298.15 : (SETS_C[Math.max(0, index - 1)] ?? 215) + 273.15
    const since = second < 5_400 ? second : (second - 5_400) % 4_200
    bedTemperatureK.push(set + (previous - set) * Math.exp(-since / 240))
  }
  const lnRates = points.slice(0, 7).map((point) => Math.log(point.rateMolPerKgS?.value ?? 1))
  const fit = exampleFit(
    'R-0008',
    points.slice(0, 7).map((point) => point.temperatureK.value),
    lnRates,
  )
  const reduction: RunReduction = {
    clockOffset: null,
    runCode: 'R-0008',
    holds,
    injections,
    points,
    fit,
    fitWithAllPoints: null,
    noFitReason: '',
    returnedHold: { holdNumber: 8, returnsTo: 4, ratio: estimateOf(0.863, 0.004), lossPerH: 0.035 },
    meanCarbonBalance: 1.001,
    sharedSources: [],
    cautions: [decay],
    mayCount: true,
  }
  return {
    run,
    uploads: [
      upload('upload-1', 'R-0008-rig.csv', 'rig-log', 3_577),
      upload('upload-2', 'R-0008-analysis.xlsx', 'analyser', 50),
    ],
    reduction,
    notReadyReason: '',
    trace: { timeS, bedTemperatureK, setTemperatureK },
  }
}
