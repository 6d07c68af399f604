import fc from 'fast-check'
import { expect, test } from 'vitest'
import { safeNextPath } from '@/lib/auth/next-path'

const ORIGIN = 'https://bench.example'
const pieces = fc.constantFrom(
  '/',
  '\\',
  '.',
  '..',
  '//',
  '%2f',
  '%5c',
  '%2e',
  '\t',
  '\n',
  '\u0000',
  ' ',
  '@',
  ':',
  '?',
  '#',
  'evil.example',
  'https:',
  'javascript:',
  'a',
  '\u2028',
  '\ufeff',
  '％',
)

test('whatever is asked for, the answer stays on this origin and is stable', () => {
  fc.assert(
    fc.property(
      fc.oneof(
        fc.array(pieces, { maxLength: 8 }).map((list) => list.join('')),
        fc.string(),
        fc.string({ unit: 'binary' }),
      ),
      (text) => {
        for (const next of [text, `/${text}`]) {
          const path = safeNextPath(next)
          expect(new URL(path, ORIGIN).origin).toBe(ORIGIN)
          expect(path.startsWith('/')).toBe(true)
          expect(path.startsWith('//')).toBe(false)
          expect(safeNextPath(path)).toBe(path)
        }
      },
    ),
    { numRuns: 20_000, seed: 20261201 },
  )
})
