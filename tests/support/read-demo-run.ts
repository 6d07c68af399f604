import path from 'node:path'
import { type RunInput, type ReductionMethod } from '@/lib/analysis/reduction/run-input'
import { type SharedSource } from '@/lib/analysis/estimate'
import { type ReadingChannel } from '@/lib/domain/intake'
import { answerQuestions } from '@/lib/uploads/column-map/answer-question'
import { detectFile, readFile } from '@/lib/uploads/read-file'
import truth from '../reference/methanation-truth.json'
import { demoMethodChange, demoRuns, demoSamples } from '../../db/demo/demo-campaign'
import { methodSettingsSchema } from '@/lib/domain/method'

const FILES = path.resolve(import.meta.dirname, '../../db/demo/files')

const CONTEXT = {
  rigTimeZone: 'UTC',
  barometerPa: 101_325,
  species: ['CO2', 'H2', 'CH4', 'CO', 'H2O', 'Ar', 'N2'],
  flowReference: { temperatureK: 273.15, pressurePa: 101_325 },
}

/** What a person answers to the questions of these files; nothing else is corrected by hand. */
const ANSWERS = {
  'date-order': 'day-first',
  'time-zone': 'UTC',
  'flow-reference': '0 °C, 101.325 kPa',
  'pressure-kind': 'gauge',
  barometer: '101325',
  basis: 'dry',
} as const

/** Channels of one demo file by the product's own readers, its questions answered as its laboratory would. */
export async function readDemoChannels(name: string): Promise<Map<string, Float64Array>> {
  const file = path.join(FILES, name)
  const { detections, problems } = await detectFile(file, CONTEXT)
  const found = detections[0]
  if (found === undefined) throw new Error(`${name}: ${JSON.stringify(problems)}`)
  const answers: Record<string, string> = {}
  for (const question of found.questions)
    answers[question.key] = question.proposal ?? ANSWERS[question.key as keyof typeof ANSWERS]
  const { specification } = answerQuestions(found.proposal, found.facts, answers)
  const reading = await readFile(file, specification, CONTEXT)
  if (reading.questions.length > 0) throw new Error(`${name}: still open ${JSON.stringify(reading.questions)}`)
  return new Map(reading.channels.map((channel: ReadingChannel) => [channel.name, channel.values]))
}

const withPrefix = (channels: Map<string, Float64Array>, prefix: string) =>
  Object.fromEntries(
    [...channels]
      .filter(([name]) => name.startsWith(prefix))
      .map(([name, values]) => [name.slice(prefix.length), values]),
  )

/** Input of one demo run, read from its files by the real readers, with records and method as the simulator's truth states them. */
export async function readDemoRun(code: string, change: Partial<ReductionMethod> = {}): Promise<RunInput> {
  const run = demoRuns.find((entry) => entry.code === code)
  if (run === undefined) throw new Error(`no demo run ${code}`)
  const log = await readDemoChannels(run.logFile)
  const analyser = await readDemoChannels(run.analyserFile)
  const empty = new Float64Array()
  const u = truth.relative_standard_uncertainty
  const sites = demoSamples.find((sample) => sample.code === run.sampleCode)?.siteDensityMolPerKg ?? null
  const factors = Object.entries(truth.response_factors)
  const sources: SharedSource[] = [
    { id: 'flow', kind: 'flow', label: 'flow controllers', standardUncertainty: u.flow, unit: '1' },
    { id: 'mass', kind: 'mass', label: 'weighing', standardUncertainty: u.mass, unit: '1' },
    {
      id: 'thermocouple',
      kind: 'thermocouple',
      label: 'bed thermocouple',
      standardUncertainty: u.temperature_offset_k,
      unit: 'K',
    },
    { id: 'sites', kind: 'site-count', label: 'site count', standardUncertainty: u.site_density, unit: '1' },
    ...factors.map(([species]): SharedSource => ({
      id: `factor:${species}`,
      kind: 'response-factor',
      label: `response factor of ${species}`,
      standardUncertainty: u.response_factor,
      unit: '1',
    })),
  ]
  const settings = methodSettingsSchema.parse(demoMethodChange)
  return {
    runCode: code,
    kind: run.kind,
    log: {
      uploadId: 'log',
      fileName: run.logFile,
      timeS: log.get('time') ?? empty,
      sourceRow: log.get('sourceRow') ?? empty,
      bedTemperatureK: log.get('bedTemperatureK') ?? empty,
      setTemperatureK: log.get('setTemperatureK') ?? null,
      wallTemperatureK: log.get('wallTemperatureK') ?? null,
      inletPressurePa: log.get('inletPressurePa') ?? null,
      outletPressurePa: log.get('outletPressurePa') ?? null,
      flowMolPerS: withPrefix(log, 'flowMolPerS.'),
      isBypass: log.get('isBypass') ?? null,
    },
    injections: {
      uploadId: 'analyser',
      fileName: run.analyserFile,
      timeS: analyser.get('time') ?? empty,
      number: analyser.get('number') ?? empty,
      sourceRow: analyser.get('sourceRow') ?? empty,
      lastSourceRow: analyser.get('lastSourceRow') ?? analyser.get('sourceRow') ?? empty,
      response: withPrefix(analyser, 'area.'),
      isCensored: withPrefix(analyser, 'isCensored.'),
      quantity: 'area',
    },
    responseFactors: Object.fromEntries(
      factors.map(([species, molePerArea]) => [
        species,
        { molePerArea, relativeStandardUncertainty: u.response_factor, sourceId: `factor:${species}` },
      ]),
    ),
    reaction: {
      name: truth.reaction,
      keyReactant: truth.key,
      // the file of the truth has one shape for all steps; species a step does not touch are left out
      steps: truth.steps.map((step) =>
        Object.fromEntries(
          Object.entries(step).filter((entry): entry is [string, number] => typeof entry[1] === 'number'),
        ),
      ),
      carbonNumber: { CO2: 1, CH4: 1, CO: 1 },
    },
    loading: {
      catalystMassKg: run.catalystMassKg,
      massRelativeStandardUncertainty: u.mass,
      massSourceId: 'mass',
      diluentMassKg: run.diluentMassKg,
      particleDiameterM: (run.particleMinimumM + run.particleMaximumM) / 2,
      tubeInnerDiameterM: run.tubeInnerDiameterM,
      bedLengthM: run.bedLengthM,
      particleDensityKgPerM3: 1250,
      poreFraction: 0.5,
      tortuosity: 3,
      meanPoreRadiusM: 6e-9,
      bedVoidFraction: 0.4,
    },
    siteCount:
      sites === null
        ? null
        : {
            molPerKg: sites,
            relativeStandardUncertainty: u.site_density,
            sourceId: 'sites',
            method: 'H2 chemisorption',
          },
    method: { ...settings, rateOrders: truth.rate_orders.map((orders) => ({ ...orders })), ...change },
    holdEdits: [],
    exclusions: [],
    flowSourceId: 'flow',
    thermocoupleSourceId: 'thermocouple',
    sharedSources: sources,
  }
}
