import { type Caution, type CautionSeverity } from '@/lib/analysis/caution'
import { type Working } from '@/lib/analysis/working'
import { type Ranking, type RankingRow } from '@/lib/domain/ranking'
import { type RunDecision } from '@/lib/domain/run'
import { estimateOf, exampleFit } from './example-fit'

const HIGH = [488.17, 498.16, 508.14, 518.17, 528.15, 538.15, 548.2]
const LN_MICRO = -6 * Math.log(10) + 3 * Math.log(10)

const caution = (code: string, severity: CautionSeverity, tag: string, sentence: string): Caution => ({
  code,
  severity,
  tag,
  sentence,
  value: null,
  limit: null,
  unit: '',
  source: 'common practice',
  holdNumber: null,
})

const working = (title: string): Working => ({
  title,
  formula: 'Ea = −R · d ln r / d(1/T)',
  symbols: [
    {
      symbol: 'R',
      meaning: 'gas constant',
      value: 8.314462618,
      unit: 'J mol⁻¹ K⁻¹',
      standardUncertainty: null,
      uncertaintyKind: 'none',
    },
    {
      symbol: 'n',
      meaning: 'holds in the line',
      value: 7,
      unit: '',
      standardUncertainty: null,
      uncertaintyKind: 'none',
    },
  ],
  result: {
    symbol: 'E_a',
    meaning: 'apparent activation energy',
    value: 84.4,
    unit: 'kJ mol⁻¹',
    standardUncertainty: 0.15,
    uncertaintyKind: 'own',
  },
  assumptions: ['one rate-limiting step over the range'],
  source: 'common practice',
  from: ['R-0001, holds 1 to 7'],
  leftOut: ['hold 8: it returns to hold 4'],
  notes: ['weights 1/u² with the between-hold term'],
})

interface Seed {
  code: string
  name: string
  temperaturesK?: number[]
  lnMicro: number[]
  tof: number
  tofHalf: number
  rank: number
  low: number
  high: number
  best: number
  carbon: number
  decay: number
  cautions: Caution[]
  decision: RunDecision | null
}

const seeds: Seed[] = [
  {
    code: 'CQ-104',
    name: '1 wt% Ru on titania',
    lnMicro: [-0.104, 0.2448, 0.5912, 0.9295, 1.2521, 1.5653, 1.8515],
    tof: 0.095,
    tofHalf: 0.009,
    rank: 1,
    low: 1,
    high: 1,
    best: 0.9998,
    carbon: 1.0,
    decay: 0.001,
    cautions: [],
    decision: 'counts',
  },
  {
    code: 'CQ-106',
    name: '5 wt% Ni on silica, 2 mm pellets',
    lnMicro: [0.4992, 0.8856, 1.2524, 1.5733, 1.8863, 2.1842, 2.4368],
    tof: 0.044,
    tofHalf: 0.005,
    rank: 2,
    low: 2,
    high: 3,
    best: 0.0001,
    carbon: 1.0,
    decay: 0.0,
    cautions: [
      caution('line-bends', 'caution', 'line bends, p 0.0004', 'The line bends: a parabola fits better, p 0.0004.'),
      caution(
        'pore-diffusion',
        'caution',
        'pore diffusion likely',
        'The observed rate times L²/(D c) is 1.4, above 0.3.',
      ),
    ],
    decision: 'repeat',
  },
  {
    code: 'CQ-103',
    name: '10 wt% Ni on ceria',
    lnMicro: [-0.6203, -0.173, 0.2658, 0.6823, 1.0711, 1.4661, 1.8382],
    tof: 0.041,
    tofHalf: 0.004,
    rank: 3,
    low: 2,
    high: 4,
    best: 0,
    carbon: 1.0,
    decay: 0.0,
    cautions: [],
    decision: 'counts',
  },
  {
    code: 'CQ-102',
    name: '5 wt% Ni, 1 wt% La on alumina',
    lnMicro: [-0.3936, 0.0015, 0.3742, 0.7417, 1.0823, 1.4174, 1.7456],
    tof: 0.033,
    tofHalf: 0.003,
    rank: 4,
    low: 3,
    high: 5,
    best: 0,
    carbon: 0.99,
    decay: 0.002,
    cautions: [
      caution('carbon-balance', 'grave', 'run R-0009 carbon 0.91', 'Run R-0009 gives back 91 % of its carbon.'),
    ],
    decision: 'counts',
  },
  {
    code: 'CQ-107',
    name: '5 wt% Ni on silica, lot 2',
    lnMicro: [-0.9535, -0.5675, -0.1924, 0.1636, 0.5038, 0.8386, 1.1514],
    tof: 0.026,
    tofHalf: 0.003,
    rank: 5,
    low: 4,
    high: 6,
    best: 0,
    carbon: 1.0,
    decay: 0.035,
    cautions: [caution('decay', 'caution', 'decays 3.5 % h⁻¹', 'The returned hold is 13.5 % below hold 4.')],
    decision: null,
  },
  {
    code: 'CQ-101',
    name: '5 wt% Ni on alumina, reference',
    lnMicro: [-1.1406, -0.7179, -0.3177, 0.0671, 0.4393, 0.7919, 1.1415],
    tof: 0.02,
    tofHalf: 0.002,
    rank: 6,
    low: 5,
    high: 6,
    best: 0,
    carbon: 1.0,
    decay: 0.0,
    cautions: [],
    decision: 'counts',
  },
  {
    code: 'CQ-105',
    name: '5 wt% Co on alumina',
    temperaturesK: [503.15, 513.12, 523.16, 533.15, 543.18, 553.16, 563.14],
    lnMicro: [-1.3943, -0.9369, -0.4801, -0.057, 0.3573, 0.75, 1.1271],
    tof: 0.012,
    tofHalf: 0.0013,
    rank: 7,
    low: 7,
    high: 7,
    best: 0,
    carbon: 1.0,
    decay: 0.0,
    cautions: [],
    decision: 'counts',
  },
]

function rowOf(seed: Seed, index: number): RankingRow {
  const temperaturesK = seed.temperaturesK ?? HIGH
  const runCode = `R-${String(index + 1).padStart(4, '0')}`
  const fit = exampleFit(
    runCode,
    temperaturesK,
    seed.lnMicro.map((value) => value + LN_MICRO),
    seed.code === 'CQ-103' ? { leftOut: [2] } : {},
  )
  const rate = Math.exp(fit.lnRateAtReference.value)
  const rateInterval = fit.intervals.lnRateAtReference
  return {
    sampleId: `sample-${seed.code}`,
    sampleCode: seed.code,
    sampleName: seed.name,
    kind: 'catalyst',
    runs: [
      {
        runId: `run-${runCode}`,
        code: runCode,
        state: seed.decision ? 'decided' : 'handed-in',
        decision: seed.decision,
        isIncluded: true,
        reason: '',
      },
    ],
    rank: seed.rank,
    rankInterval: [seed.low, seed.high],
    probabilityBest: seed.best,
    activationEnergyJPerMol: fit.activationEnergyJPerMol,
    activationEnergyInterval: fit.intervals.activationEnergyJPerMol,
    lnPreExponential: fit.lnPreExponential,
    lnPreExponentialInterval: fit.intervals.lnPreExponential,
    rateMolPerKgS: estimateOf(rate, rate * (fit.lnRateAtReference.randomStandardUncertainty ?? 0), {
      'flow:rig-b': -0.008 * rate,
    }),
    rateInterval: rateInterval ? [Math.exp(rateInterval[0]), Math.exp(rateInterval[1])] : null,
    turnoverFrequencyPerS: estimateOf(seed.tof, seed.tof * 0.004, {
      [`sites:${seed.code}`]: (-seed.tofHalf / 2) * 0.98,
    }),
    turnoverFrequencyInterval: [seed.tof - seed.tofHalf, seed.tof + seed.tofHalf],
    temperatureForConversionK: estimateOf(530.2 + index * 3.1, 0.6, { 'thermocouple:rig-b': 0.5 }),
    temperatureForConversionInterval: [528.2 + index * 3.1, 532.2 + index * 3.1],
    selectivity: {
      CH4: estimateOf(0.952 - 0.004 * index, 0.003),
      CO: estimateOf(0.048 + 0.004 * index, 0.003),
    },
    selectivityIntervals: {
      CH4: [0.944 - 0.004 * index, 0.96 - 0.004 * index],
      CO: [0.04 + 0.004 * index, 0.056 + 0.004 * index],
    },
    carbonBalance: estimateOf(seed.carbon, 0.005, { 'inlet:R': -0.004 }),
    carbonBalanceInterval: [seed.carbon - 0.016, seed.carbon + 0.016],
    decayPerH: estimateOf(seed.decay, 0.001),
    decayInterval: [seed.decay - 0.0026, seed.decay + 0.0026],
    cannotTell: {},
    distinctTemperatures: 7,
    lowestTemperatureK: Math.min(...temperaturesK),
    highestTemperatureK: Math.max(...temperaturesK),
    cautions: seed.cautions,
    isProvisional: seed.decision === null,
    isShortlisted: seed.rank <= 2,
    priority: seed.rank <= 3 ? seed.rank : null,
    remark: seed.code === 'CQ-106' ? 'Crush and sieve, then again' : '',
    version: 1,
    fit,
    runFits: [],
    workings: {
      activationEnergyJPerMol: working('Apparent activation energy'),
      turnoverFrequencyPerS: working('Turnover frequency at 250 °C'),
    },
  }
}

const blank: RankingRow = {
  sampleId: 'sample-blank',
  sampleCode: 'SiC',
  sampleName: 'silicon carbide, no catalyst',
  kind: 'blank',
  runs: [
    { runId: 'run-R-0010', code: 'R-0010', state: 'decided', decision: 'counts', isIncluded: false, reason: 'blank' },
  ],
  rank: null,
  rankInterval: null,
  probabilityBest: null,
  activationEnergyJPerMol: null,
  activationEnergyInterval: null,
  lnPreExponential: null,
  lnPreExponentialInterval: null,
  rateMolPerKgS: null,
  rateInterval: null,
  turnoverFrequencyPerS: null,
  turnoverFrequencyInterval: null,
  temperatureForConversionK: null,
  temperatureForConversionInterval: null,
  selectivity: {},
  selectivityIntervals: {},
  carbonBalance: null,
  carbonBalanceInterval: null,
  decayPerH: null,
  decayInterval: null,
  cannotTell: { activationEnergyJPerMol: 'R-0010: a blank: nothing to rank.' },
  distinctTemperatures: 7,
  lowestTemperatureK: 488.15,
  highestTemperatureK: 548.15,
  cautions: [
    caution('blank', 'note', 'blank, no rate', 'A blank: conversion stays below what the analyser can tell from none.'),
  ],
  isProvisional: false,
  isShortlisted: false,
  priority: null,
  remark: '',
  version: 1,
  fit: null,
  runFits: [],
  workings: {},
}

/** An invented ranking of seven samples and a blank, for tests of what is drawn. */
export function exampleRanking(): Ranking {
  const rows = [...seeds.map(rowOf), blank]
  return {
    campaignId: 'campaign-1',
    campaignCode: 'MET-1',
    campaignName: 'Low-temperature CO₂ methanation',
    methodId: 'method-3',
    methodNumber: 3,
    rankedBy: 'turnover-frequency',
    referenceTemperatureK: 523.15,
    confidenceLevel: 0.95,
    draws: 20_000,
    seed: 1,
    engineId: 'test',
    computedAt: '2026-03-14T10:00:00Z',
    includesProvisional: true,
    rows,
    holdTemperaturesK: rows.flatMap((row) => row.fit?.points.map((point) => point.temperatureK) ?? []),
    summary:
      'CQ-106 and CQ-103 cannot be told apart at 250 °C (ratio 1.06, 0.94 to 1.19); CQ-104 leads in more than 99 % of the draws.',
  }
}
