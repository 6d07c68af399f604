import { expect, test } from 'vitest'
import { answerQuestions } from '@/lib/uploads/column-map/answer-question'
import { detectFile, readFile } from '@/lib/uploads/read-file'
import { dialects } from '@/tests/support/dialects'

// Each file is written from a plain table by tests/support/dialects.ts, which also says what must be found in it and what must be asked.

/** The same conversion written in another order differs in the last bit or two. */
const ROUNDING = 1e-12

test('there are enough of them, each with a name of its own', () => {
  expect(dialects.length).toBeGreaterThanOrEqual(60)
  expect(new Set(dialects.map(({ name }) => name)).size).toBe(dialects.length)
})

test.each(dialects.map((dialect) => [dialect.name, dialect] as const))('%s', async (_name, dialect) => {
  const context = { rigTimeZone: dialect.rigTimeZone, barometerPa: 101_325, species: ['CO2', 'H2', 'CH4', 'CO', 'Ar'] }
  const { detections, problems: found } = await detectFile(dialect.bytes, context)
  const detection = detections[0]
  if (detection === undefined) throw new Error(JSON.stringify(found))
  const keys = new Set<string>(detection.questions.map(({ key }) => key))
  const answersTo = (among: ReadonlySet<string>) =>
    Object.fromEntries(Object.entries(dialect.asked).filter(([key]) => among.has(key)))
  const before = answerQuestions(detection.proposal, detection.facts, answersTo(keys))
  // what the look at the file could not see shows when its rows are read
  const first = await readFile(dialect.bytes, before.specification, context)
  const asked = new Set([...keys, ...first.questions.map(({ key }) => key)])
  const after = answerQuestions(before.specification, before.facts, answersTo(asked))
  const reading = await readFile(dialect.bytes, after.specification, context)
  const stillOpen = reading.questions.map(({ key }) => key)
  expect({ asked: [...asked], stillOpen }).toEqual({ asked: Object.keys(dialect.asked), stillOpen: [] })
  expect(reading.kind).toBe(dialect.kind)
  expect(
    reading.problems.map(({ code, line }) => ({ code, line })),
    reading.problems.map(({ sentence }) => sentence).join('\n'),
  ).toEqual(dialect.problems.map(({ code, line }) => ({ code, line: line ?? null })))
  const channels = new Map(reading.channels.map((channel) => [channel.name, [...channel.values]]))
  expect(channels.get('time')?.map((value) => Math.round(value * 1e3) / 1e3)).toEqual(dialect.times)
  for (const [name, expected] of Object.entries(dialect.channels)) {
    const values = channels.get(name) ?? []
    expect(values.length, name).toBe(expected.length)
    values.forEach((value, index) => {
      const wanted = expected[index] ?? Number.NaN
      if (Number.isNaN(wanted)) expect(value, `${name}, row ${index}`).toBeNaN()
      else
        expect(Math.abs(value - wanted), `${name}, row ${index}: ${value} for ${wanted}`).toBeLessThanOrEqual(
          ROUNDING * Math.max(1e-6, Math.abs(wanted)),
        )
    })
  }
})
