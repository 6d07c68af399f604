import { rmSync } from 'node:fs'
import { afterAll, beforeAll, describe, expect, test, vi } from 'vitest'
import { getDatabase, type OpenDatabase } from '@/db/client'
import { reductions, runs, users } from '@/db/schema'
import { saveMethod, getCurrentMethod } from '@/lib/access/campaigns'
import { getRanking, getRunResult } from '@/lib/access/results'
import { addExclusion, decide, getRun } from '@/lib/access/runs'
import { addSiteCount } from '@/lib/access/samples'
import { newSiteCountSchema } from '@/lib/domain/sample'
import { type Actor, type CampaignRole } from '@/lib/domain/role'
import { loadDemoCampaign } from '@/scripts/demo-loader'
import { actorOf } from '@/tests/support/actors'
import { freshDatabase } from '@/tests/support/fresh-database'
import truth from '@/tests/reference/methanation-truth.json'

/* The files go to a store of this test's own. */
const dataDir = await vi.hoisted(async () => {
  const { mkdtempSync } = await import('node:fs')
  const { tmpdir } = await import('node:os')
  process.env.DATA_DIR = mkdtempSync(`${tmpdir()}/ik-results-`)
  return process.env.DATA_DIR
})

const WANTED = ['R-0001', 'R-0004', 'R-0008', 'R-0009']
let opened: OpenDatabase
let campaignId = ''
let actors: Record<CampaignRole, Actor>
const runIds = new Map<string, string>()

beforeAll(async () => {
  opened = await freshDatabase()
  campaignId = (await loadDemoCampaign({ isWanted: (code) => WANTED.includes(code) })).campaignId
  const db = await getDatabase()
  const people = await db.select({ id: users.id, role: users.role }).from(users)
  const of = (role: CampaignRole) =>
    actorOf(role, { userId: people.find((one) => one.role === role)?.id ?? '', memberships: { [campaignId]: role } })
  actors = { technician: of('technician'), researcher: of('researcher'), lead: of('lead'), guest: of('guest') }
  for (const run of await db.select({ id: runs.id, code: runs.code }).from(runs)) runIds.set(run.code, run.id)
}, 180_000)
afterAll(async () => {
  await opened.close()
  rmSync(dataDir, { recursive: true, force: true })
})

const idOf = (code: string) => runIds.get(code) ?? ''
const rowOf = async (code: string, options = {}) =>
  (await getRanking(actors.researcher, campaignId, options)).rows.find((row) => row.sampleCode === code)
const countOf = async () => (await (await getDatabase()).select({ key: reductions.key }).from(reductions)).length

describe('results from files, kept under their content', () => {
  test('a run handed in as files gives the activation energy that was put in', async () => {
    const { reduction, trace } = await getRunResult(actors.technician, idOf('R-0001'))
    const [low, high] = reduction?.fit?.intervals.activationEnergyJPerMol ?? [Number.NaN, Number.NaN]
    const expected = (truth.runs[0]?.apparent_ea_kj_mol ?? Number.NaN) * 1000
    expect(expected).toBeGreaterThan(low)
    expect(expected).toBeLessThan(high)
    expect(trace?.timeS.length).toBeLessThanOrEqual(2_000)
  })

  test('asking again computes nothing anew and gives the same bits', async () => {
    const first = await getRanking(actors.researcher, campaignId)
    const before = await countOf()
    const again = await getRanking(actors.lead, campaignId)
    expect(again.rows).toEqual(first.rows)
    expect(await countOf()).toBe(before)
    // the time is that of the computing, not of the answer
    expect(again.computedAt).toBe(first.computedAt)
    const elsewhere = await getRanking(actors.lead, campaignId, { referenceTemperatureK: 521.15 })
    expect(Date.parse(elsewhere.computedAt)).toBeGreaterThan(Date.parse(first.computedAt))
  })

  test('every number of a row carries its uncertainty, or the row says why it cannot', async () => {
    const { rows } = await getRanking(actors.researcher, campaignId)
    for (const row of rows) {
      const numbers = {
        activationEnergyJPerMol: [row.activationEnergyJPerMol, row.activationEnergyInterval],
        lnPreExponential: [row.lnPreExponential, row.lnPreExponentialInterval],
        rateMolPerKgS: [row.rateMolPerKgS, row.rateInterval],
        turnoverFrequencyPerS: [row.turnoverFrequencyPerS, row.turnoverFrequencyInterval],
        temperatureForConversionK: [row.temperatureForConversionK, row.temperatureForConversionInterval],
        carbonBalance: [row.carbonBalance, row.carbonBalanceInterval],
        decayPerH: [row.decayPerH, row.decayInterval],
        ...Object.fromEntries(
          Object.entries(row.selectivity).map(([name, estimate]) => [
            `selectivity.${name}`,
            [estimate, row.selectivityIntervals[name] ?? null],
          ]),
        ),
      } as const
      for (const [name, [estimate, interval]] of Object.entries(numbers)) {
        if (estimate === null || interval === null)
          expect(row.cannotTell[name], `${row.sampleCode} ${name}`).toMatch(/\.$/)
        else {
          expect(interval[0], `${row.sampleCode} ${name}`).toBeLessThan(interval[1])
          expect(row.workings[name]?.result.standardUncertainty, `${row.sampleCode} ${name}`).toBeGreaterThan(0)
        }
      }
    }
  })

  test('the figures beside the line hold what the invented reactor was given', async () => {
    const [fresh, decaying] = [await rowOf('CQ-101'), await rowOf('CQ-107')]
    // the line rests on rates that fell while it was measured: its working says what it would be without the loss (truth.json: 86.51 kJ/mol)
    const notes = decaying?.workings['activationEnergyJPerMol']?.notes ?? []
    expect(Number(/^R-0008: .* would be (\d+\.\d) kJ\/mol/.exec(notes[0] ?? '')?.[1])).toBeCloseTo(86.5, -0.5)
    // the interval that the working states is the one in the table, not that of the line alone
    const [least, most] = decaying?.activationEnergyInterval ?? [Number.NaN, Number.NaN]
    const stated = /interval ([\d.]+) to ([\d.]+) kJ\/mol\.$/.exec(notes[1] ?? '')
    expect(Number(stated?.[1])).toBeCloseTo(least / 1_000, 2)
    expect(Number(stated?.[2])).toBeCloseTo(most / 1_000, 2)
    expect(notes).toContainEqual(expect.stringMatching(/^Of the line alone: 95.0 % interval/))
    const inside = (value: number, interval: readonly [number, number] | null | undefined, widest: number) => {
      expect(interval?.[0]).toBeLessThan(value)
      expect(interval?.[1]).toBeGreaterThan(value)
      expect((interval?.[1] ?? Infinity) - (interval?.[0] ?? 0)).toBeLessThan(widest)
    }
    // 2 % lies between 245 and 255 °C, where the reactor was at 1.6157 % and 2.3405 %
    const [low, high] = [3, 4].map((hold) => truth.runs[0]?.holds[hold]?.conversion_at_end ?? Number.NaN)
    const share = Math.log(0.02 / (low ?? NaN)) / Math.log((high ?? NaN) / (low ?? NaN))
    const ofBalance = fresh?.workings['carbonBalance']?.notes[0] ?? ''
    expect(ofBalance).toMatch(/^95.0 % interval [\d.]+ to [\d.]+ mol\/mol\.$/)
    expect(Number(/interval ([\d.]+)/.exec(ofBalance)?.[1])).toBeCloseTo(fresh?.carbonBalanceInterval?.[0] ?? NaN, 4)
    inside(1 / ((1 - share) / 518.15 + share / 528.15), fresh?.temperatureForConversionInterval, 14)
    // nothing was lost in these three; three standard uncertainties, since one run in twenty lies beyond two
    for (const row of [fresh, decaying, await rowOf('CQ-103')]) {
      const [balance, interval] = [row?.carbonBalance?.value ?? Number.NaN, row?.carbonBalanceInterval]
      const u = ((interval?.[1] ?? Number.NaN) - (interval?.[0] ?? Number.NaN)) / 4
      expect(Math.abs(balance - 1)).toBeLessThan(3 * u)
      expect(u).toBeLessThan(0.005)
    }
    const lossOf = (code: string) => truth.samples.find((sample) => sample.code === code)?.decay_per_h ?? Number.NaN
    inside(lossOf('CQ-107'), decaying?.decayInterval, 0.02)
    inside(lossOf('CQ-101'), fresh?.decayInterval, 0.02)
    expect(decaying?.decayInterval?.[0]).toBeGreaterThan(0)
  })

  test('a corrected site count moves the turnover frequency and not the rate or the energy', async () => {
    const before = await rowOf('CQ-101')
    const sampleId = before?.sampleId ?? ''
    await addSiteCount(
      actors.technician,
      sampleId,
      newSiteCountSchema.parse({ method: 'CO chemisorption', molPerKg: 0.124, relativeStandardUncertainty: 0.05 }),
    )
    const after = await rowOf('CQ-101')
    const ratio = (after?.turnoverFrequencyPerS?.value ?? 0) / (before?.turnoverFrequencyPerS?.value ?? 1)
    // 0.062 mol/kg before, 0.124 after: half the turnovers per site
    expect(Math.abs(ratio - 0.5)).toBeLessThan(1e-12)
    expect(after?.rateMolPerKgS?.value).toBe(before?.rateMolPerKgS?.value)
    expect(after?.activationEnergyJPerMol?.value).toBe(before?.activationEnergyJPerMol?.value)
  })

  test('a point left out moves the line at once, stays listed, and the line with it is given too', async () => {
    const before = await getRunResult(actors.researcher, idOf('R-0004'))
    const atS = before.reduction?.points[1]?.hold.foundStartS ?? Number.NaN
    await addExclusion(actors.researcher, idOf('R-0004'), { kind: 'hold', atS, reason: 'the valve was stuck' })
    const { reduction } = await getRunResult(actors.researcher, idOf('R-0004'))
    expect(reduction?.points).toHaveLength(8)
    expect(reduction?.points[1]?.excluded?.reason).toBe('the valve was stuck')
    expect(reduction?.fit?.activationEnergyJPerMol.value).not.toBe(before.reduction?.fit?.activationEnergyJPerMol.value)
    expect(reduction?.fitWithAllPoints?.activationEnergyJPerMol.value).toBe(
      before.reduction?.fit?.activationEnergyJPerMol.value,
    )
  })

  test('a run with a grave doubt counts only after a lead decided', async () => {
    const before = await rowOf('CQ-102')
    expect(before?.rank).toBeNull()
    expect(before?.runs[0]?.reason).toMatch(/until a lead decides/)
    const run = await getRun(actors.lead, idOf('R-0009'))
    await decide(
      actors.lead,
      run.id,
      { decision: 'counts', reason: 'the loss is water in the line, not carbon' },
      run.version,
    )
    expect((await rowOf('CQ-102'))?.runs[0]?.isIncluded).toBe(true)
  })

  test('another method re-values everything, and the old version can be looked through', async () => {
    const before = await rowOf('CQ-103')
    const { settings, number } = await getCurrentMethod(actors.lead, campaignId)
    await saveMethod(actors.lead, campaignId, {
      settings: { ...settings, rateLaw: 'differential' },
      reason: 'to see what the differential law says',
    })
    const after = await rowOf('CQ-103')
    expect(after?.activationEnergyJPerMol?.value).toBeLessThan(before?.activationEnergyJPerMol?.value ?? 0)
    expect((await rowOf('CQ-103', { methodNumber: number }))?.activationEnergyJPerMol).toEqual(
      before?.activationEnergyJPerMol,
    )
  })

  test('at another reference temperature the same lines are read elsewhere', async () => {
    const warm = await rowOf('CQ-101', { referenceTemperatureK: 543.15 })
    const cold = await rowOf('CQ-101', { referenceTemperatureK: 503.15 })
    const energy = warm?.activationEnergyJPerMol?.value ?? 0
    const expected = Math.exp((-energy / 8.31446261815324) * (1 / 543.15 - 1 / 503.15))
    expect((warm?.rateMolPerKgS?.value ?? 0) / (cold?.rateMolPerKgS?.value ?? 1) / expected - 1).toBeLessThan(1e-9)
    // outside its own range a line ranks nothing
    expect((await rowOf('CQ-101', { referenceTemperatureK: 700 }))?.rank).toBeNull()
  })

  test('who is not of the campaign, or only its guest, is told that there is nothing', async () => {
    const stranger = actorOf('researcher', { userId: 'stranger' })
    for (const actor of [stranger, actors.guest]) {
      await expect(getRanking(actor, campaignId)).rejects.toMatchObject({ code: 'not-found' })
      await expect(getRunResult(actor, idOf('R-0001'))).rejects.toMatchObject({ code: 'not-found' })
    }
  })
})
