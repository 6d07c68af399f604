import { expect, test } from 'vitest'
import path from 'node:path'
import { detectInThread, readInThread, readResponseFactorsInThread } from '@/lib/uploads/read-job'

const file = (name: string) => path.join(process.cwd(), 'db/demo/files', name)
const context = { rigTimeZone: 'UTC', barometerPa: 101_325, species: ['CO2', 'H2', 'Ar', 'N2', 'CO', 'CH4'] }

test('a workbook is looked at and read in a thread of its own', async () => {
  const { detections } = await detectInThread(file('R-0002-analysis.xlsx'), 'R-0002-analysis.xlsx', context)
  expect(detections[0]?.tableName).toBe('Peaks')
  const proposal = detections[0]?.proposal
  if (proposal === undefined) throw new Error('no table found')
  const reading = await readInThread(file('R-0002-analysis.xlsx'), 'x', proposal, context)
  expect(reading.rowCount).toBe(50)
  expect(reading.channels.find((channel) => channel.name === 'area.CH4')?.values.at(-1)).toBe(2386)
})

test('a reading that takes too long is stopped and said', async () => {
  const { detections, problems } = await detectInThread(file('R-0001-rig.csv'), 'R-0001-rig.csv', context, {
    deadlineMs: 1,
  })
  expect(detections).toEqual([])
  expect(problems.map((problem) => problem.code)).toEqual(['limit-reached'])
})

test('a cancelled reading ends', async () => {
  const controller = new AbortController()
  const reading = detectInThread(file('R-0001-rig.csv'), 'R-0001-rig.csv', context, { signal: controller.signal })
  controller.abort()
  await expect(reading).rejects.toThrow('cancelled')
})

test('a table of response factors is read in a thread, under the same clock, and its refusal names the file', async () => {
  const table = await readResponseFactorsInThread(file('response-factors.csv'), 'response-factors.csv')
  expect(table.entries).toHaveLength(6)
  await expect(
    readResponseFactorsInThread(file('response-factors.csv'), 'response-factors.csv', { deadlineMs: 1 }),
  ).rejects.toThrow(
    'response-factors.csv: Reading the file took longer than 0 s and was stopped. Nothing of it was taken in.',
  )
  await expect(readResponseFactorsInThread(file('R-0001-rig.csv'), 'log.csv')).rejects.toMatchObject({
    code: 'unprocessable',
    message: expect.stringMatching(/^log\.csv: /),
  })
})
