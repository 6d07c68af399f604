import { mkdtempSync, readdirSync, readFileSync, rmSync, writeFileSync } from 'node:fs'
import { hostname, tmpdir } from 'node:os'
import path from 'node:path'
import { afterAll, describe, expect, test } from 'vitest'
import { acquireDataFolderLock, DataFolderLockedError } from '@/db/pglite/data-folder-lock'
import { startChild } from '../../support/start-child'

const parent = mkdtempSync(path.join(tmpdir(), 'lock-'))
const folder = path.join(parent, 'database')
const file = `${folder}.lock`
afterAll(() => rmSync(parent, { recursive: true, force: true }))

const holdLock = () => startChild('tests/integration/db/children/hold-lock.mts', folder)
const owner = (): Record<string, unknown> => JSON.parse(readFileSync(file, 'utf8'))

/** Whoever tries it from this process, and what came of it. */
function attempt(): 'taken' | 'refused' {
  try {
    acquireDataFolderLock(folder).release()
    return 'taken'
  } catch (error) {
    if (error instanceof DataFolderLockedError) return 'refused'
    throw error
  }
}
const attempts = () => Array.from({ length: 20 }, attempt)
const all = (outcome: 'taken' | 'refused') => new Array<string>(20).fill(outcome)

// nothing here depends on where the rows are kept
describe.skipIf(process.env.TEST_BACKEND === 'postgres')('the lock of the data folder', () => {
  test('holder alive: a second process is refused 20 times of 20, with its number in the sentence', async () => {
    const holder = holdLock()
    await holder.line('held')
    expect(attempts()).toEqual(all('refused'))
    expect(() => acquireDataFolderLock(folder)).toThrow(`process ${holder.process.pid} has it`)
    expect(owner().pid).toBe(holder.process.pid)
    await holder.kill()
  })

  test('holder killed: 20 times of 20 the next one takes it over, and a second one beside that is refused', async () => {
    const outcomes: string[] = []
    for (let round = 0; round < 20; round++) {
      const holder = holdLock()
      await holder.line('held')
      outcomes.push(attempt())
      await holder.kill()
    }
    expect(outcomes).toEqual(all('refused'))
    expect(attempts()).toEqual(all('taken'))
    expect(readdirSync(parent)).toEqual([])
  })

  test("number reused: a later process with the dead holder's number does not keep the folder shut", async () => {
    const bystander = startChild('tests/integration/db/children/hold-lock.mts', path.join(parent, 'elsewhere'))
    await bystander.line('held')
    const living = JSON.parse(readFileSync(path.join(parent, 'elsewhere.lock'), 'utf8'))
    const outcomes = Array.from({ length: 20 }, () => {
      writeFileSync(file, JSON.stringify({ ...living, startTicks: String(Number(living.startTicks) - 1) }))
      return attempt()
    })
    expect(outcomes).toEqual(all('taken'))
    writeFileSync(file, JSON.stringify(living))
    expect(attempts()).toEqual(all('refused'))
    await bystander.kill()
    expect(attempts()).toEqual(all('taken'))
  })

  test('machine started anew, or a lock cut short by it: taken over', () => {
    writeFileSync(file, JSON.stringify({ pid: process.pid, startTicks: '1', bootId: 'another', host: hostname() }))
    expect(attempt()).toBe('taken')
    writeFileSync(file, '{"pid":')
    expect(attempt()).toBe('taken')
  })

  test('held on another machine: refused, and the sentence says how to go on', () => {
    writeFileSync(file, JSON.stringify({ pid: 1, startTicks: '1', bootId: 'b', host: 'another-host' }))
    expect(() => acquireDataFolderLock(folder)).toThrow(`delete ${file}`)
    rmSync(file)
  })

  test('one process cannot take it twice, through whichever copy of the module', () => {
    const lock = acquireDataFolderLock(folder)
    expect(() => acquireDataFolderLock(folder)).toThrow('this process has it open already')
    expect(() => acquireDataFolderLock(`${parent}/../${path.basename(parent)}/database`)).toThrow('already')
    lock.release()
    expect(attempt()).toBe('taken')
  })

  test('six at once for the lock of a killed one: one has it, five are refused', async () => {
    const first = holdLock()
    await first.line('held')
    await first.kill()
    const racers = Array.from({ length: 6 }, holdLock)
    const said = await Promise.all(racers.map((racer) => racer.line('')))
    expect(said.sort()).toEqual(['held', 'refused', 'refused', 'refused', 'refused', 'refused'])
    await Promise.all(racers.map((racer) => racer.kill()))
  })
})
