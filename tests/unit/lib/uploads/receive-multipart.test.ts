import { mkdtempSync, readdirSync, readFileSync, rmSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { afterAll, expect, test } from 'vitest'
import { receiveFiles } from '@/lib/uploads/receive-multipart'
import { refusalOf } from '@/tests/support/trail'

const folder = mkdtempSync(`${tmpdir()}/ik-receive-`)
afterAll(() => rmSync(folder, { recursive: true, force: true }))

const options = { folder, maximumBytes: 10_000, maximumFiles: 5 }
const part = (head: string, content: string) => `--edge\r\n${head}\r\n\r\n${content}\r\n`
const named = (name: string) => `Content-Disposition: form-data; name="file"; filename="${name}"`
const TYPE = '\r\nContent-Type: text/csv'
const requestOf = (...parts: readonly string[]) =>
  new Request('http://localhost/', {
    method: 'POST',
    headers: { 'Content-Type': 'multipart/form-data; boundary=edge' },
    body: `${parts.join('')}--edge--\r\n`,
  })

test('files come with their names and bytes, and a plain field beside them is no file', async () => {
  const files = await receiveFiles(
    requestOf(
      part(named('a.csv') + TYPE, 'time,T\n'),
      part('Content-Disposition: form-data; name="note"', 'by A. B.'),
      part(named('b.csv') + TYPE, 'time,p\n'),
    ),
    options,
  )
  expect(files.map(({ name, path }) => [name, readFileSync(path, 'utf8')])).toEqual([
    ['a.csv', 'time,T\n'],
    ['b.csv', 'time,p\n'],
  ])
  expect(readdirSync(folder)).toHaveLength(2)
})

test.each([
  ['a file without a type', part(named('b.csv'), 'time,p\n'), 'b.csv'],
  ['a typed part without a file name', part(`Content-Disposition: form-data; name="log"${TYPE}`, 'time,p\n'), 'log'],
])('%s is refused, and not left out of what is answered as taken in', async (_name, second, said) => {
  const refusal = await refusalOf(receiveFiles(requestOf(part(named('a.csv') + TYPE, 'time,T\n'), second), options))
  expect([refusal.code, refusal.message]).toEqual([
    'invalid',
    `The part “${said}” of the form needs both a file name and a Content-Type, such as application/octet-stream. Nothing was taken in.`,
  ])
})
