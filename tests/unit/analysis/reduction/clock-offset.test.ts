import { describe, expect, test } from 'vitest'
import { proposeClockOffset } from '@/lib/analysis/reduction/clock-offset'
import { reduceRun } from '@/lib/analysis/reduction/reduce-run'
import { type InjectionTable, type RigLog } from '@/lib/analysis/reduction/run-input'
import { readDemoRun } from '@/tests/support/read-demo-run'

// The demo's files have one clock (their simulator says so): an offset that is put in must come out, within the spacing of the injections.

const PRODUCTS = ['CH4', 'CO'] as const
const shifted = (injections: InjectionTable, byS: number): InjectionTable => ({
  ...injections,
  timeS: injections.timeS.map((time) => time + byS),
})

describe('an analyser clock that is wrong by a known time', () => {
  test.each([
    ['R-0001', 0],
    ['R-0001', 2_220],
    ['R-0002', -3_600],
    ['R-0005', 5_000],
    ['R-0008', -47],
    ['R-0009', 900],
  ])('%s, fast by %i s', async (code, fastS) => {
    const { log, injections } = await readDemoRun(code)
    const found = proposeClockOffset(log, shifted(injections, fastS), PRODUCTS, 'Ar', 0)
    if (found === null) throw new Error('nothing proposed')
    expect(found.lowS).toBeLessThanOrEqual(-fastS)
    expect(found.highS).toBeGreaterThanOrEqual(-fastS)
    // one injection every 12 min: nothing finer can be told
    expect(found.highS - found.lowS).toBeLessThanOrEqual(720 + 30)
    expect(found.agreeing).toBe(found.compared)
  })

  test('clocks that agree already are said to', async () => {
    const { log, injections } = await readDemoRun('R-0001')
    const found = proposeClockOffset(log, injections, PRODUCTS, 'Ar', 0)
    expect(found?.agreeingAsSet).toBe(found?.agreeing)
    expect(found?.lowS).toBeLessThanOrEqual(0)
    expect(found?.highS).toBeGreaterThanOrEqual(0)
  })
})

test('a run whose clocks disagree says so, with the offset; one whose clocks agree does not', async () => {
  const input = await readDemoRun('R-0001')
  const codes = (fastS: number) =>
    reduceRun({ ...input, injections: shifted(input.injections, fastS) }).cautions.filter(
      ({ code }) => code === 'clocks-disagree',
    )
  expect(codes(0)).toEqual([])
  const [caution] = codes(2_400)
  expect(caution?.tag).toBe('clock off by 40 min')
  expect(Math.abs((caution?.value ?? 0) + 2_400)).toBeLessThanOrEqual(375)
  expect(caution?.sentence).toMatch(/ahead of the rig’s .* 50 of 50 injections would then agree/)
})

test('injections of another day are told, a few before the start are not', async () => {
  const input = await readDemoRun('R-0001')
  const outside = (byS: number) =>
    reduceRun({ ...input, injections: shifted(input.injections, byS) }).cautions.filter(
      ({ code }) => code === 'injections-outside-log',
    )
  expect(outside(0)).toEqual([])
  // five injections of twelve minutes each before the log begins: a tenth of fifty
  expect(outside(-3_600 - 600)).toEqual([])
  expect(outside(-86_400)).toMatchObject([{ value: 1, tag: '50 injections outside the log' }])
})

describe('a signal every ten seconds times the valve to ten seconds', () => {
  // valve turns at 3,000 s and 9,000 s; the analyser's clock is 1,234 s fast
  const timeS = Float64Array.from({ length: 1_200 }, (_, i) => i * 10)
  const log: Pick<RigLog, 'timeS' | 'isBypass'> = {
    timeS,
    isBypass: timeS.map((time) => (time < 3_000 || time >= 9_000 ? 1 : 0)),
  }
  const methane = timeS.map((time) =>
    time >= 3_000 && time < 9_000 ? 5 + (time % 70) / 70 : 0.02 + (time % 30) / 3_000,
  )
  const table = (values: Float64Array): InjectionTable => ({
    uploadId: '',
    fileName: '',
    timeS: timeS.map((time) => time + 1_234),
    number: timeS.map((_, i) => i + 1),
    sourceRow: timeS.map((_, i) => i + 1),
    lastSourceRow: timeS.map((_, i) => i + 1),
    response: { CH4: values, Ar: timeS.map(() => 100) },
    isCensored: { CH4: new Float64Array(1_200), Ar: new Float64Array(1_200) },
    quantity: 'area',
  })

  test('found to ten seconds', () => {
    const found = proposeClockOffset(log, table(methane), ['CH4'], 'Ar', 0)
    expect(Math.abs((found?.offsetS ?? 0) + 1_234)).toBeLessThanOrEqual(10)
    expect((found?.highS ?? 0) - (found?.lowS ?? 0)).toBeLessThanOrEqual(10)
  })

  test('gas that does not differ tells nothing', () =>
    expect(proposeClockOffset(log, table(timeS.map((time) => 5 + (time % 70) / 70)), ['CH4'], 'Ar', 0)).toBeNull())
  test('a log without a valve tells nothing', () =>
    expect(proposeClockOffset({ ...log, isBypass: null }, table(methane), ['CH4'], 'Ar', 0)).toBeNull())
  test('a valve that never turned tells nothing', () =>
    expect(proposeClockOffset({ ...log, isBypass: timeS.map(() => 0) }, table(methane), ['CH4'], 'Ar', 0)).toBeNull())
  test('five injections are too few', () => {
    const few = table(methane)
    const cut = (values: Float64Array) => values.slice(298, 303)
    expect(
      proposeClockOffset(
        log,
        { ...few, timeS: cut(few.timeS), response: { CH4: cut(methane), Ar: cut(timeS.map(() => 100)) } },
        ['CH4'],
        'Ar',
        0,
      ),
    ).toBeNull()
  })
})
