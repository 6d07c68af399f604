// From "confirm" to the new ranking, and another person's page while a 100 MB log is taken in. Both are printed, nothing is asserted.
//   npm run build && npx tsx tests/bench/confirm-to-ranking.mts
import { createWriteStream, mkdtempSync, readFileSync, rmSync, statSync } from 'node:fs'
import { openAsBlob } from 'node:fs'
import { once } from 'node:events'
import { tmpdir } from 'node:os'
import path from 'node:path'
import { startServer } from '../support/demo-server'
import { demoClient, percentile } from '../support/demo-client'

interface Item {
  readonly id: string
  readonly version: number
  readonly state: string
  readonly detection: {
    readonly questions: readonly {
      readonly key: string
      readonly proposal: string | null
      readonly choices: readonly { readonly value: string }[]
    }[]
  } | null
}

const ROWS = 960_000
const FILES = path.resolve(import.meta.dirname, '../../db/demo/files')

async function writeLargeLog(file: string): Promise<void> {
  const out = createWriteStream(file)
  out.write(
    'time,T set [°C],T bed [°C],T wall [°C],p in [bar(a)],p out [bar(a)],Q CO2 [mL/min (0 °C 1013 mbar)],Q H2 [mL/min (0 °C 1013 mbar)],Q Ar [mL/min (0 °C 1013 mbar)],Q N2 [mL/min (0 °C 1013 mbar)],aux 1,aux 2\n',
  )
  const start = Date.UTC(2026, 4, 1)
  let block = ''
  for (let row = 0; row < ROWS; row++) {
    const set = 215 + 10 * (Math.floor(row / 120_000) % 7)
    const n = ((row * 2_654_435_761) % 1_000) / 1_000
    block += `${new Date(start + row * 1_000).toISOString().slice(0, 19)}Z,${set.toFixed(2)},${(set + n - 0.5).toFixed(3)},${(set + 1.8 + n).toFixed(3)},${(1.3 + n / 100).toFixed(4)},${(1.28 + n / 100).toFixed(4)},${(7.2 + n / 50).toFixed(4)},${(36 + n / 5).toFixed(4)},${(4.8 + n / 50).toFixed(4)},${(12 + n / 20).toFixed(4)},${(n * 1e3).toFixed(5)},${(n * 1e4).toFixed(5)}\n`
    if (block.length > 1_000_000) {
      if (!out.write(block)) await once(out, 'drain')
      block = ''
    }
  }
  out.end(block)
  await once(out, 'close')
}

const folder = mkdtempSync(path.join(tmpdir(), 'ik-bench-'))
const server = await startServer({ data: 'demo' })
try {
  const technician = await demoClient(server.origin, 'technician')
  const lead = await demoClient(server.origin, 'lead')
  const me = await technician<{ memberships: Record<string, string> }>('/me')
  const campaignId = Object.keys(me.memberships)[0] ?? ''
  const rigs = await technician<{ items: { id: string; code: string }[] }>('/rigs')
  const samples = await technician<{ items: { id: string; code: string }[] }>('/samples')
  const json = { 'content-type': 'application/json' }
  const newRun = (startedAt: string) =>
    technician<{ id: string }>('/runs', {
      method: 'POST',
      headers: json,
      body: JSON.stringify({
        campaignId,
        rigId: rigs.items.find((rig) => rig.code === 'Rig B')?.id,
        channel: '1',
        startedAt,
        loading: {
          sampleId: samples.items.find((sample) => sample.code === 'CQ-101')?.id,
          catalystMassKg: 80.3e-6,
          diluentMassKg: 450e-6,
        },
      }),
    })
  const send = async (runId: string, file: string, name: string) => {
    const form = new FormData()
    form.append('file', await openAsBlob(file, { type: 'application/octet-stream' }), name)
    const { items } = await technician<{ items: Item[] }>(`/runs/${runId}/uploads`, { method: 'POST', body: form })
    const item = items[0]
    if (item === undefined) throw new Error(`${name} was not answered`)
    return item
  }
  const settle = async (item: Item): Promise<Item> => {
    const questions = item.detection?.questions ?? []
    if (questions.length === 0) return item
    const answers = Object.fromEntries(questions.map((one) => [one.key, one.proposal ?? one.choices[0]?.value ?? '']))
    return technician<Item>(`/uploads/${item.id}`, {
      method: 'PATCH',
      headers: { ...json, 'if-match': `W/"${item.id}.${item.version}"` },
      body: JSON.stringify({ answers }),
    })
  }
  const confirm = (item: Item) =>
    technician<Item>(`/uploads/${item.id}/confirm`, {
      method: 'POST',
      headers: { 'if-match': `W/"${item.id}.${item.version}"` },
    })
  const ranking = () =>
    lead<{ rows: { runs: { runId: string; isIncluded: boolean }[] }[] }>(`/campaigns/${campaignId}/ranking`)

  await ranking()
  const small = await newRun('2026-03-02T07:30:00Z')
  const log = await settle(await send(small.id, path.join(FILES, 'R-0001-rig.csv'), 'log.csv'))
  const analyser = await settle(await send(small.id, path.join(FILES, 'R-0001-analysis.csv'), 'analysis.csv'))
  await confirm(log)
  const from = performance.now()
  await confirm(analyser)
  const table = await ranking()
  const ms = performance.now() - from
  const isIn = table.rows.flatMap((row) => row.runs).some((run) => run.runId === small.id && run.isIncluded)
  console.log(
    `confirm to new ranking, 3,577 log rows and 50 injections: ${ms.toFixed(0)} ms (run in the ranking: ${isIn})`,
  )

  const large = path.join(folder, 'large.csv')
  await writeLargeLog(large)
  const megabytes = statSync(large).size / 1e6
  const run = await newRun('2026-05-01T00:00:00Z')
  const waits: number[] = []
  let isGoing = true
  const watching = (async () => {
    while (isGoing) {
      const asked = performance.now()
      await ranking()
      waits.push(performance.now() - asked)
      await new Promise((resolve) => setTimeout(resolve, 50))
    }
  })()
  const began = performance.now()
  const sent = await send(run.id, large, 'large.csv')
  const received = performance.now()
  const confirmed = await confirm(await settle(sent))
  const done = performance.now()
  isGoing = false
  await watching
  console.log(
    `${megabytes.toFixed(0)} MB log, ${ROWS.toLocaleString('en-GB')} rows x 12 columns: ${((received - began) / 1e3).toFixed(1)} s to receive and look at, ${((done - received) / 1e3).toFixed(1)} s to read and store (${confirmed.state}); ${(megabytes / ((done - began) / 1e3)).toFixed(0)} MB/s end to end`,
  )
  console.log(
    `another person's ranking meanwhile, ${waits.length} answers: median ${percentile(waits, 0.5).toFixed(0)} ms, 95 % ${percentile(waits, 0.95).toFixed(0)} ms, worst ${percentile(waits, 1).toFixed(0)} ms`,
  )
  if (process.platform === 'linux') {
    const peak = /VmHWM:\s+(\d+)/.exec(readFileSync(`/proc/${process.pid}/status`, 'utf8'))?.[1]
    console.log(`(this client's own peak memory: ${Math.round(Number(peak) / 1024)} MB)`)
  }
} finally {
  await server.stop()
  rmSync(folder, { recursive: true, force: true })
}
