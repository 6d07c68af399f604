import { readdirSync, readFileSync } from 'node:fs'
import path from 'node:path'
import { zipSync, type Zippable } from 'fflate'
import { describe, expect, test } from 'vitest'
import { readChromatogram } from '@/lib/uploads/formats/chromatogram/read-chromatogram'
import { detectFile, readFile } from '@/lib/uploads/read-file'
import { readDemoChannels } from '@/tests/support/read-demo-run'
import reference from '../../../reference/intake/chromatograms.json'

// Against a second reader: tests/reference/intake/read-chromatograms.py, scipy.io.netcdf_file.

const FOLDER = path.resolve(import.meta.dirname, '../../../fixtures/chromatograms')
const NAMES = readdirSync(FOLDER).sort()
const bytesOf = (name: string) => new Uint8Array(readFileSync(path.join(FOLDER, name)))
const CONTEXT = { rigTimeZone: 'UTC', barometerPa: 101_325, species: ['CO2', 'H2', 'CH4', 'CO', 'Ar', 'N2'] }
const packed = (files: Zippable) => zipSync(files, { level: 0 })
const whole = () => packed(Object.fromEntries(NAMES.map((name) => [name, bytesOf(name)])))

async function readSet(bytes: Uint8Array) {
  const { detections, problems } = await detectFile(bytes, CONTEXT)
  const detection = detections[0]
  if (detection === undefined) return { detection: null, problems, channels: new Map<string, Float64Array>() }
  const reading = await readFile(bytes, detection.proposal, CONTEXT)
  return {
    detection,
    problems: reading.problems,
    channels: new Map(reading.channels.map((channel) => [channel.name, channel.values])),
  }
}

test.each(NAMES)('%s has the peaks that another reader finds', (name) => {
  const { injectedAt, peaks, retentionUnit } = readChromatogram(bytesOf(name), name)
  const expected = reference[name as keyof typeof reference]
  expect(injectedAt).toBe(expected.stamp)
  expect(retentionUnit).toBe('s')
  expect(peaks.map((peak) => [peak.name, peak.area, peak.retentionTime])).toEqual(expected.peaks)
})

test('a set in one archive is one series, asks nothing, and has the areas of its twin table', async () => {
  const { detection, problems, channels } = await readSet(whole())
  expect(problems).toEqual([])
  expect(detection?.questions).toEqual([])
  expect(detection?.format).toBe('chromatography-netcdf')
  expect(detection?.dialect).toBe('50 chromatograms, ASTM E1947, header in line 1')
  const twin = await readDemoChannels('R-0001-analysis.csv')
  expect(channels.get('time')).toEqual(twin.get('time'))
  expect(channels.get('number')).toEqual(twin.get('number'))
  for (const species of ['H2', 'Ar', 'N2', 'CO', 'CH4', 'CO2']) {
    const here = channels.get(`area.${species}`) ?? new Float64Array()
    const there = twin.get(`area.${species}`) ?? new Float64Array()
    expect(here).toHaveLength(50)
    here.forEach((area, row) => {
      const table = there[row] ?? Number.NaN
      if (Number.isNaN(table)) return expect(area).toBeNaN()
      // the table is written to one decimal, the chromatogram holds single precision (24 bits)
      const spacing = 2 ** (Math.floor(Math.log2(table)) - 23)
      expect(Math.abs(area - table)).toBeLessThanOrEqual(0.05 + spacing / 2 + 1e-9)
    })
    expect(channels.get(`isCensored.${species}`)).toEqual(twin.get(`isCensored.${species}`))
  }
})

test('injections are put in order of time, whatever the files are called', async () => {
  const { channels } = await readSet(
    packed({
      'a.cdf': bytesOf('R-0001_003.cdf'),
      'b.cdf': bytesOf('R-0001_001.cdf'),
      'c.cdf': bytesOf('R-0001_002.cdf'),
    }),
  )
  expect([...(channels.get('time') ?? [])]).toEqual(
    ['07:35', '07:47', '07:59'].map((clock) => Date.parse(`2026-03-02T${clock}:00Z`) / 1_000),
  )
})

describe('what is wrong is said with the file it is wrong in', () => {
  test('one of a set that was cut off: the others stand', async () => {
    const { problems, channels } = await readSet(
      packed({
        'good.cdf': bytesOf('R-0001_012.cdf'),
        'cut.cdf': bytesOf('R-0001_013.cdf').slice(0, 900),
      }),
    )
    expect(problems).toMatchObject([
      {
        code: 'unreadable',
        severity: 'problem',
        sentence:
          '“cut.cdf” is damaged or was cut off while it was copied. Copy it again from the instrument and add it.',
      },
    ])
    expect(channels.get('number')).toHaveLength(1)
  })

  test('alone and cut off', async () => {
    const { detection, problems } = await readSet(bytesOf('R-0001_012.cdf').slice(0, 300))
    expect(detection).toBeNull()
    expect(problems).toMatchObject([{ code: 'unreadable', severity: 'fatal' }])
  })

  test('a netCDF file of something else', async () => {
    // an empty classic file: no dimensions, attributes or variables (the format's own grammar: CDF, 1, then zeros)
    const { detection, problems } = await readSet(
      new Uint8Array([0x43, 0x44, 0x46, 1, ...new Array<number>(28).fill(0)]),
    )
    expect(detection).toBeNull()
    expect(problems).toMatchObject([{ code: 'unsupported-format', severity: 'fatal', found: 'variables none' }])
  })

  test('a directory that claims more peaks than the file has bytes', async () => {
    const bytes = bytesOf('R-0001_012.cdf')
    const view = new DataView(bytes.buffer)
    const text = Buffer.from(bytes).indexOf('peak_number')
    // length of the dimension stands after its name, padded to four bytes; a name has 32 letters
    view.setUint32(text + 12, 2_000_000_000)
    const from = performance.now()
    const { detection, problems } = await readSet(bytes)
    expect(detection).toBeNull()
    expect(problems[0]?.found).toContain('64000000000 values')
    expect(performance.now() - from).toBeLessThan(5_000)
  })

  test('an archive with something else in it', async () => {
    const { problems } = await readSet(
      packed({ 'a.cdf': bytesOf('R-0001_001.cdf'), 'notes.txt': new Uint8Array([65]) }),
    )
    expect(problems[0]?.found).toBe('“a.cdf” in a packed file')
  })
})
