import { createHash } from 'node:crypto'
import { readFileSync, rmSync } from 'node:fs'
import path from 'node:path'
import { and, eq } from 'drizzle-orm'
import { afterAll, beforeAll, expect, test, vi } from 'vitest'
import { GET as getContent } from '@/app/api/v1/uploads/[uploadId]/content/route'
import { POST as postConfirm } from '@/app/api/v1/uploads/[uploadId]/confirm/route'
import { GET as getPreview } from '@/app/api/v1/uploads/[uploadId]/preview/route'
import { GET as getUpload, PATCH as patchUpload } from '@/app/api/v1/uploads/[uploadId]/route'
import { POST as postSetAside } from '@/app/api/v1/uploads/[uploadId]/set-aside/route'
import { GET as getUploads, POST as postUploads } from '@/app/api/v1/runs/[runId]/uploads/route'
import { getDatabase, type OpenDatabase } from '@/db/client'
import { selectReadingChannels } from '@/db/queries/readings'
import { auditEntries, campaigns, columnMaps, members, readingSets, runs, uploads } from '@/db/schema'
import { createToken } from '@/lib/access/tokens'
import { type Role, type TokenScope } from '@/lib/domain/role'
import { actorOf } from '@/tests/support/actors'
import { freshDatabase } from '@/tests/support/fresh-database'
import { makePerson } from '@/tests/support/make-person'
import { makeRun } from '@/tests/support/make-run'

/* The files go to a store of this test's own. */
const dataDir = await vi.hoisted(async () => {
  const { mkdtempSync } = await import('node:fs')
  const { tmpdir } = await import('node:os')
  process.env.DATA_DIR = mkdtempSync(`${tmpdir()}/ik-uploads-`)
  return process.env.DATA_DIR
})

const ORIGIN = 'http://localhost:3000'
const DEMO = path.join(process.cwd(), 'db/demo/files')

let opened: OpenDatabase
let run: Awaited<ReturnType<typeof makeRun>>
let technician: string
let guest: string
let stranger: string

async function tokenOf(
  role: Exclude<Role, 'admin'>,
  campaignId: string,
  scopes: TokenScope[] = ['read', 'intake', 'write'],
  boundTo: string | null = null,
): Promise<string> {
  const person = await makePerson(role, { passwordHash: 'none' })
  await (await getDatabase()).insert(members).values({ campaignId, userId: person.id, role })
  const owner = actorOf(role, { userId: person.id, memberships: { [campaignId]: role } })
  const { secret } = await createToken(owner, { name: 'rig computer', scopes, campaignId: boundTo, validDays: 1 })
  return secret
}

beforeAll(async () => {
  opened = await freshDatabase()
  const db = await getDatabase()
  run = await makeRun(db, 'own')
  const other = await makeRun(db, 'other')
  technician = await tokenOf('technician', run.campaignId)
  guest = await tokenOf('guest', run.campaignId)
  stranger = await tokenOf('technician', other.campaignId)
})
afterAll(async () => {
  await opened.close()
  rmSync(dataDir, { recursive: true, force: true })
})

const bearer = (secret: string) => ({ Authorization: `Bearer ${secret}` })
const ofRun = () => ({ params: Promise.resolve({ runId: run.runId }) })
const ofUpload = (uploadId: string) => ({ params: Promise.resolve({ uploadId }) })

interface SaidUpload {
  readonly id: string
  readonly version: number
  readonly state: string
  readonly isNew: boolean
  readonly kind: string | null
  readonly failure: string | null
  readonly fileName: string
  readonly detection: {
    readonly questions: readonly { readonly key: string; readonly proposal: string | null }[]
  } | null
}

/** Sends files as a browser would. */
async function add(secret: string, files: Readonly<Record<string, Uint8Array | string>>) {
  const form = new FormData()
  for (const [name, content] of Object.entries(files))
    form.append(
      'file',
      new File([typeof content === 'string' ? content : new Uint8Array(content)], name, {
        type: 'application/octet-stream',
      }),
    )
  const answer = await postUploads(
    new Request(`${ORIGIN}/api/v1/runs/${run.runId}/uploads`, { method: 'POST', headers: bearer(secret), body: form }),
    ofRun(),
  )
  const body: { items?: readonly SaidUpload[]; detail?: string } = await answer.json()
  return { answer, items: body.items ?? [], body }
}

async function first(files: Readonly<Record<string, Uint8Array | string>>): Promise<SaidUpload> {
  const { items, body } = await add(technician, files)
  const [item] = items
  if (item === undefined) throw new Error(JSON.stringify(body))
  return item
}

const sendTo = (id: string, tag: string | null, body?: unknown, secret = technician) =>
  new Request(`${ORIGIN}/api/v1/uploads/${id}`, {
    method: 'POST',
    headers: {
      ...bearer(secret),
      ...(tag === null ? {} : { 'If-Match': tag }),
      ...(body === undefined ? {} : { 'Content-Type': 'application/json' }),
    },
    ...(body === undefined ? {} : { body: JSON.stringify(body) }),
  })
const tagOf = (upload: { id: string; version: number }) => `W/"${upload.id}.${String(upload.version)}"`
const fetchOf = (id: string, secret = technician) =>
  new Request(`${ORIGIN}/api/v1/uploads/${id}`, { headers: bearer(secret) })

async function setsOf(uploadId: string) {
  const rows = await (await getDatabase()).select().from(readingSets)
  return rows.filter((row) => row.uploadId === uploadId)
}

const demo = (name: string) => readFileSync(path.join(DEMO, name))

test('a log and the analyser’s results go in together, are answered and confirmed', async () => {
  const { answer, items } = await add(technician, {
    'R-0005-rig.csv': demo('R-0005-rig.csv'),
    'R-0002-analysis.xlsx': demo('R-0002-analysis.xlsx'),
  })
  expect(answer.status).toBe(201)
  expect(items.map((item) => [item.fileName, item.kind, item.state, item.isNew])).toEqual([
    ['R-0005-rig.csv', 'rig-log', 'needs-answers', true],
    ['R-0002-analysis.xlsx', 'analyser', 'ready', true],
  ])
  const [log, results] = items
  if (log === undefined || results === undefined) throw new Error('two files went in')
  // day and month cannot be told apart, and nothing says at which state volumes are counted: neither is guessed
  expect(log.detection?.questions.map(({ key, proposal }) => [key, proposal])).toEqual([
    ['date-order', 'month-first'],
    ['flow-reference', null],
  ])

  const open = await postConfirm(sendTo(log.id, tagOf(log)), ofUpload(log.id))
  expect(open.status).toBe(422)
  expect(await open.json()).toMatchObject({ issues: [{ field: 'date-order' }, { field: 'flow-reference' }] })
  expect(await setsOf(log.id)).toEqual([])

  const half = await patchUpload(
    sendTo(log.id, tagOf(log), { answers: { 'date-order': 'month-first' } }),
    ofUpload(log.id),
  )
  expect(half.status).toBe(200)
  const halfway: SaidUpload = await half.json()
  expect(halfway).toMatchObject({ state: 'needs-answers', version: log.version + 1 })
  expect(half.headers.get('etag')).toBe(tagOf(halfway))
  expect(halfway.detection?.questions.map(({ key }) => key)).toEqual(['flow-reference'])

  const stale = await patchUpload(
    sendTo(log.id, tagOf(log), { answers: { 'flow-reference': '273.15/101325' } }),
    ofUpload(log.id),
  )
  expect(stale.status).toBe(412)

  const whole = await patchUpload(
    sendTo(log.id, tagOf(halfway), { answers: { 'flow-reference': '273.15/101325' } }),
    ofUpload(log.id),
  )
  const ready: SaidUpload = await whole.json()
  expect(ready).toMatchObject({ state: 'ready', detection: { questions: [] } })

  const preview = await getPreview(fetchOf(log.id), ofUpload(log.id))
  const shown: { rowCount: number; channels: { name: string; minimum: number }[] } = await preview.json()
  expect(shown.rowCount).toBe(3577)
  expect(shown.channels.map(({ name }) => name)).toContain('flowMolPerS.CO2')
  expect(await setsOf(log.id)).toEqual([])

  expect((await postConfirm(sendTo(log.id, null), ofUpload(log.id))).status).toBe(428)
  expect((await postConfirm(sendTo(log.id, tagOf(halfway)), ofUpload(log.id))).status).toBe(412)
  expect(await setsOf(log.id)).toEqual([])
  const confirmed = await postConfirm(sendTo(log.id, tagOf(ready)), ofUpload(log.id))
  expect(confirmed.status).toBe(200)
  expect(await confirmed.json()).toMatchObject({ state: 'confirmed', kind: 'rig-log' })
  const [set] = await setsOf(log.id)
  expect(set?.rowCount).toBe(3577)
  const pressure = (await selectReadingChannels(await getDatabase(), set?.id ?? '', ['inletPressurePa'])).get(
    'inletPressurePa',
  )
  // the first row reads 4.282 psig; a psi is 6894.757 Pa (NIST SP 811, 2008, B.8) on top of the room's 101325 Pa on record
  expect(pressure?.[0]).toBeCloseTo(101_325 + 4.282 * 6_894.757, 1)

  const taken = await postConfirm(sendTo(results.id, tagOf(results)), ofUpload(results.id))
  expect(taken.status).toBe(200)
  expect((await setsOf(results.id))[0]?.rowCount).toBe(50)
})

test('the chromatograms of one request are one series: kept once, whatever order they come in, and its parts are in the history', async () => {
  const folder = path.join(process.cwd(), 'tests/fixtures/chromatograms')
  const names = ['R-0001_001.cdf', 'R-0001_002.cdf', 'R-0001_012.cdf']
  const files = names.map((name) => [name, readFileSync(path.join(folder, name))] as const)
  const { answer, items } = await add(technician, Object.fromEntries(files))
  expect(answer.status).toBe(201)
  expect(items).toMatchObject([
    { fileName: 'R-0001_001 and 2 more chromatograms.zip', kind: 'analyser', state: 'ready', isNew: true },
  ])
  const again = await add(technician, Object.fromEntries([...files].reverse()))
  expect(again.items).toMatchObject([{ id: items[0]?.id, isNew: false }])
  const [entry] = await (
    await getDatabase()
  )
    .select()
    .from(auditEntries)
    .where(and(eq(auditEntries.action, 'upload.add'), eq(auditEntries.entityId, items[0]?.id ?? '')))
  expect(entry?.after).toMatchObject({
    parts: files.map(([name, bytes]) => ({
      name,
      byteCount: bytes.length,
      sha256: createHash('sha256').update(bytes).digest('hex'),
    })),
  })
  const alone = await add(technician, { 'R-0001_003.cdf': readFileSync(path.join(folder, 'R-0001_003.cdf')) })
  expect(alone.items).toMatchObject([{ fileName: 'R-0001_003.cdf', kind: 'analyser', state: 'ready' }])
})

test('a second log over the same hours is refused before it is mixed in, and taken once the first is set aside', async () => {
  const rows = (from: string, count: number) =>
    `time;T bed [°C]\n${Array.from({ length: count }, (_, i) => `${new Date(Date.parse(from) + i * 60_000).toISOString()};${String(200 + i)},5`).join('\n')}\n`
  const one = await first({ 'morning.csv': rows('2031-01-01T08:00:00Z', 30) })
  expect((await postConfirm(sendTo(one.id, tagOf(one)), ofUpload(one.id))).status).toBe(200)
  const other = await first({ 'again.csv': rows('2031-01-01T08:10:00Z', 30) })
  const refused = await postConfirm(sendTo(other.id, tagOf(other)), ofUpload(other.id))
  expect(refused.status).toBe(409)
  expect(await refused.json()).toMatchObject({
    detail: expect.stringMatching(
      /^\S+ has log over the same time from “morning.csv” \(2031-01-01 08:00 UTC to 2031-01-01 08:29 UTC; this file goes from 2031-01-01 08:10 UTC/,
    ),
  })
  expect(await setsOf(other.id)).toEqual([])
  // a logger that was started again goes on where the first file ended
  const later = await first({ 'afternoon.csv': rows('2031-01-01T08:30:00Z', 5) })
  expect((await postConfirm(sendTo(later.id, tagOf(later)), ofUpload(later.id))).status).toBe(200)
  const now: SaidUpload = await (await getUpload(fetchOf(one.id), ofUpload(one.id))).json()
  await postSetAside(sendTo(one.id, tagOf(now), { reason: 'the clock was wrong' }), ofUpload(one.id))
  const laterNow: SaidUpload = await (await getUpload(fetchOf(later.id), ofUpload(later.id))).json()
  await postSetAside(sendTo(later.id, tagOf(laterNow), { reason: 'the clock was wrong' }), ofUpload(later.id))
  expect((await postConfirm(sendTo(other.id, tagOf(other)), ofUpload(other.id))).status).toBe(200)
})

test('bytes that another run of the campaign has are said to be there', async () => {
  const text = 'time;T bed [°C]\n2026-03-02 07:30:00;25,1\n2026-03-02 07:30:10;25,7\n2026-03-02 07:30:20;25,9\n'
  await first({ 'first.csv': text })
  const db = await getDatabase()
  const [here] = await db.select().from(runs).where(eq(runs.id, run.runId))
  if (here === undefined) throw new Error('the run is there')
  await db.insert(runs).values({ ...here, id: 'twin-run', code: 'R-TWIN' })
  const form = new FormData()
  form.append('file', new File([text], 'second.csv', { type: 'application/octet-stream' }))
  const answer = await postUploads(
    new Request(`${ORIGIN}/api/v1/runs/twin-run/uploads`, { method: 'POST', headers: bearer(technician), body: form }),
    { params: Promise.resolve({ runId: 'twin-run' }) },
  )
  const { items } = (await answer.json()) as { items: { problems: { code: string; sentence: string }[] }[] }
  expect(items[0]?.problems).toMatchObject([
    {
      code: 'same-bytes',
      sentence: `${here.code} has these very bytes too, as “first.csv”. One measurement must not count for two runs: is this file of this run?`,
    },
  ])
})

test('the same bytes again are answered with the file that has them, whatever they are called', async () => {
  const once = await add(technician, {
    'once.csv': 'time;T bed [C]\n2026-03-02 07:30:00;25,1\n2026-03-02 07:30:10;25,3\n',
  })
  expect(once.answer.status).toBe(201)
  const twice = await add(technician, {
    'twice.csv': 'time;T bed [C]\n2026-03-02 07:30:00;25,1\n2026-03-02 07:30:10;25,3\n',
  })
  expect(twice.answer.status).toBe(200)
  expect(twice.items[0]).toMatchObject({ id: once.items[0]?.id, fileName: 'once.csv', isNew: false })
})

test('a file whose reading was cut short is read when it is handed in again', async () => {
  const content = 'time;T bed [C]\n2026-03-02 09:30:00;25,1\n2026-03-02 09:30:10;25,3\n'
  const upload = await first({ 'cut-short.csv': content })
  const db = await getDatabase()
  await db.update(uploads).set({ state: 'received', detection: null, kind: null }).where(eq(uploads.id, upload.id))
  const again = await add(technician, { 'cut-short.csv': content })
  expect(again.answer.status).toBe(200)
  expect(again.items[0]).toMatchObject({ id: upload.id, kind: 'rig-log', isNew: false })
  expect(again.items[0]?.detection).not.toBeNull()
})

test('to somebody who is not in the campaign the run and its files do not exist', async () => {
  const upload = await first({ 'hidden.csv': 'time;T bed [C]\n2026-03-02 10:30:00;25,1\n2026-03-02 10:30:10;25,3\n' })
  expect((await add(stranger, { 'a.csv': 'a;b\n1;2\n' })).answer.status).toBe(404)
  expect((await getUploads(new Request(`${ORIGIN}/api/v1/any`, { headers: bearer(stranger) }), ofRun())).status).toBe(
    404,
  )
  for (const call of [getUpload, getPreview, getContent])
    expect((await call(fetchOf(upload.id, stranger), ofUpload(upload.id))).status).toBe(404)
  const change = { answers: { kind: 'attachment' } }
  expect((await patchUpload(sendTo(upload.id, tagOf(upload), change, stranger), ofUpload(upload.id))).status).toBe(404)
  expect((await postConfirm(sendTo(upload.id, tagOf(upload), undefined, stranger), ofUpload(upload.id))).status).toBe(
    404,
  )
})

test('a guest of the campaign reads editions, so files do not exist for them either', async () => {
  const upload = await first({ 'shown.csv': 'time;T bed [C]\n2026-03-02 11:30:00;25,1\n2026-03-02 11:30:10;25,3\n' })
  expect((await getUpload(fetchOf(upload.id, guest), ofUpload(upload.id))).status).toBe(404)
  const before = (await (await getDatabase()).select().from(uploads)).length
  expect((await add(guest, { 'a.csv': 'a;b\n1;2\n' })).answer.status).toBe(404)
  expect((await postConfirm(sendTo(upload.id, tagOf(upload), undefined, guest), ofUpload(upload.id))).status).toBe(404)
  const aside = sendTo(upload.id, tagOf(upload), { reason: 'not mine to say' }, guest)
  expect((await postSetAside(aside, ofUpload(upload.id))).status).toBe(404)
  expect((await (await getDatabase()).select().from(uploads)).length).toBe(before)
})

test('once the run is handed in, a technician whose run it is not changes no file of it', async () => {
  const upload = await first({ 'late.csv': 'time;T bed [C]\n2026-03-02 13:30:00;25,1\n2026-03-02 13:30:10;25,3\n' })
  const db = await getDatabase()
  await db.update(runs).set({ state: 'handed-in' }).where(eq(runs.id, run.runId))
  try {
    expect((await add(technician, { 'a.csv': 'a;b\n1;2\n' })).answer.status).toBe(403)
    expect((await getUpload(fetchOf(upload.id), ofUpload(upload.id))).status).toBe(200)
    const change = sendTo(upload.id, tagOf(upload), { answers: { kind: 'attachment' } })
    expect((await patchUpload(change, ofUpload(upload.id))).status).toBe(403)
    expect((await postConfirm(sendTo(upload.id, tagOf(upload)), ofUpload(upload.id))).status).toBe(403)
    const aside = sendTo(upload.id, tagOf(upload), { reason: 'too late for it' })
    expect((await postSetAside(aside, ofUpload(upload.id))).status).toBe(403)
  } finally {
    await db.update(runs).set({ state: 'open' }).where(eq(runs.id, run.runId))
  }
})

test('a run handed in while the file is on its way takes it no more', async () => {
  const db = await getDatabase()
  const text = new TextEncoder()
  const parts = ['time;T bed [C]\n2026-03-02 16:30:00;25,1\n', '2026-03-02 16:30:10;25,3\n']
  const body = new ReadableStream<Uint8Array>({
    async pull(controller) {
      const part = parts.shift()
      if (part === undefined) {
        await db.update(runs).set({ state: 'handed-in' }).where(eq(runs.id, run.runId))
        controller.close()
      } else controller.enqueue(text.encode(part))
    },
  })
  const before = (await db.select().from(uploads)).length
  try {
    const answer = await postUploads(
      new Request(`${ORIGIN}/api/v1/runs/${run.runId}/uploads`, {
        method: 'POST',
        headers: { ...bearer(technician), 'Content-Type': 'application/octet-stream', 'X-File-Name': 'slow.csv' },
        body,
        ...{ duplex: 'half' },
      }),
      ofRun(),
    )
    expect(answer.status).toBe(403)
    expect(await answer.json()).toMatchObject({ detail: expect.stringContaining('while the run is open') })
    expect((await db.select().from(uploads)).length).toBe(before)
  } finally {
    await db.update(runs).set({ state: 'open' }).where(eq(runs.id, run.runId))
  }
})

test('an instrument’s token takes readings in and out of nothing: what counts, or was put aside, it leaves as it is', async () => {
  const instrument = await tokenOf('technician', run.campaignId, ['read', 'intake'])
  const bound = await tokenOf('technician', run.campaignId, ['read', 'intake', 'write'], run.campaignId)
  const maps = async () => (await (await getDatabase()).select().from(columnMaps)).length
  const before = await maps()
  const send = (upload: SaidUpload, body?: unknown, secret = instrument) =>
    sendTo(upload.id, tagOf(upload), body, secret)

  const { items } = await add(instrument, {
    'rig.csv': 'time;T reactor bed [C]\n2026-03-02 14:30:00;25,1\n2026-03-02 14:30:10;25,3\n',
  })
  const [added] = items
  if (added === undefined) throw new Error('one file went in')
  const reason = { reason: 'of another run' }
  expect((await postSetAside(send(added, reason), ofUpload(added.id))).status).toBe(403)
  const taken = await postConfirm(send(added), ofUpload(added.id))
  expect(taken.status).toBe(200)
  const confirmed: SaidUpload = await taken.json()
  expect(confirmed).toMatchObject({ state: 'confirmed', kind: 'rig-log', columnMapId: null })
  // the rig's maps serve every campaign: neither a token of scope intake nor one bound to a campaign adds to them
  expect(await maps()).toBe(before)
  const [set] = await setsOf(added.id)
  expect([set?.rowCount, set?.supersededAt]).toEqual([2, null])

  const refused = [
    await postSetAside(send(confirmed, reason), ofUpload(added.id)),
    await postConfirm(send(confirmed), ofUpload(added.id)),
    await patchUpload(send(confirmed, { answers: { kind: 'attachment' } }), ofUpload(added.id)),
  ]
  expect(refused.map(({ status }) => status)).toEqual([403, 403, 403])
  expect(await refused[0]?.json()).toMatchObject({ detail: expect.stringContaining('needs the scope write') })
  expect((await setsOf(added.id)).map((one) => one.supersededAt)).toEqual([null])

  const again = await postConfirm(send(confirmed, undefined, bound), ofUpload(added.id))
  expect(again.status).toBe(200)
  expect(await maps()).toBe(before)
  const twice: SaidUpload = await again.json()
  const aside = await postSetAside(send(twice, reason, bound), ofUpload(added.id))
  const gone: SaidUpload = await aside.json()
  expect([aside.status, gone.state]).toEqual([200, 'set-aside'])
  expect((await patchUpload(send(gone, { answers: {} }), ofUpload(added.id))).status).toBe(403)
  expect((await postConfirm(send(gone), ofUpload(added.id))).status).toBe(403)
  // a person's own token of scope write brings it back, and its columns are known from then on
  const back = await postConfirm(send(gone, undefined, technician), ofUpload(added.id))
  expect([back.status, await maps()]).toEqual([200, before + 1])
})

test('in a closed campaign no file is answered for', async () => {
  const upload = await first({ 'closed.csv': 'time;T bed [C]\n2026-03-02 15:30:00;25,1\n2026-03-02 15:30:10;25,3\n' })
  const db = await getDatabase()
  const close = (closedAt: Date | null) =>
    db.update(campaigns).set({ closedAt }).where(eq(campaigns.id, run.campaignId))
  await close(new Date('2026-04-01T00:00:00Z'))
  try {
    const change = sendTo(upload.id, tagOf(upload), { answers: { kind: 'attachment' } })
    const answer = await patchUpload(change, ofUpload(upload.id))
    expect(answer.status).toBe(409)
    expect(await answer.json()).toMatchObject({ detail: expect.stringContaining('The campaign is closed.') })
  } finally {
    await close(null)
  }
  const read = await getUpload(fetchOf(upload.id), ofUpload(upload.id))
  expect(await read.json()).toMatchObject({ state: upload.state, version: upload.version })
})

test('what cannot be read stays, and can be kept beside the run', async () => {
  const upload = await first({ 'bed.txt': 'The bed looked grey after unloading.\nNothing else to say.\n' })
  expect(upload).toMatchObject({ state: 'failed', detection: null })
  expect((await postConfirm(sendTo(upload.id, tagOf(upload)), ofUpload(upload.id))).status).toBe(422)
  const change = sendTo(upload.id, tagOf(upload), { answers: { kind: 'attachment' } })
  const kept: SaidUpload = await (await patchUpload(change, ofUpload(upload.id))).json()
  const confirmed = await postConfirm(sendTo(upload.id, tagOf(kept)), ofUpload(upload.id))
  expect(confirmed.status).toBe(200)
  expect(await confirmed.json()).toMatchObject({ state: 'confirmed', kind: 'attachment' })
  expect(await setsOf(upload.id)).toEqual([])
})

test('a file comes back byte for byte, and a browser runs nothing of it', async () => {
  const page = '<!doctype html><script>document.title = "run"</script>'
  const upload = await first({ 'page.html': page })
  // no table in it: kept, and said why it was not read
  expect(upload.state === 'failed' ? upload.failure : upload.state).toMatch(/kept|needs-answers/)
  const answer = await getContent(fetchOf(upload.id), ofUpload(upload.id))
  expect(answer.status).toBe(200)
  expect(await answer.text()).toBe(page)
  expect(answer.headers.get('content-type')).toBe('application/octet-stream')
  expect(answer.headers.get('content-disposition')).toMatch(/^attachment;/)
  expect(answer.headers.get('content-security-policy')).toContain('sandbox')
  expect(answer.headers.get('x-content-type-options')).toBe('nosniff')
  expect(answer.headers.get('cache-control')).toBe('private, no-store')
})

test('set aside, a file stays and its readings no longer count; the reason is asked for', async () => {
  const upload = await first({ 'aside.csv': 'time;T bed [C]\n2026-03-02 12:30:00;25,1\n2026-03-02 12:30:10;25,3\n' })
  const confirmed: SaidUpload = await (await postConfirm(sendTo(upload.id, tagOf(upload)), ofUpload(upload.id))).json()
  expect(confirmed.state).toBe('confirmed')
  expect((await postSetAside(sendTo(upload.id, tagOf(confirmed), { reason: '' }), ofUpload(upload.id))).status).toBe(
    400,
  )
  const aside = await postSetAside(
    sendTo(upload.id, tagOf(confirmed), { reason: 'thermocouple was not in the bed' }),
    ofUpload(upload.id),
  )
  expect(await aside.json()).toMatchObject({ state: 'set-aside', id: upload.id })
  expect((await setsOf(upload.id)).every((set) => set.supersededAt !== null)).toBe(true)
  // and can be taken up again
  const again: SaidUpload = await (await getUpload(fetchOf(upload.id), ofUpload(upload.id))).json()
  const up = await patchUpload(sendTo(upload.id, tagOf(again), { answers: {} }), ofUpload(upload.id))
  expect(await up.json()).toMatchObject({ state: 'ready' })
})
