import { readdirSync, readFileSync } from 'node:fs'
import path from 'node:path'
import { expect, test } from 'vitest'
import { actionWords } from '@/components/campaign/action-words'

const ACCESS = path.resolve(import.meta.dirname, '../../../lib/access')

test('everything that is written of a campaign has words of its own', () => {
  const actions = new Set(
    readdirSync(ACCESS)
      .filter((file) => file.endsWith('.ts'))
      .flatMap((file) =>
        [...readFileSync(path.join(ACCESS, file), 'utf8').matchAll(/'([a-z-]+\.[a-z-]+)'/g)].map(
          (found) => found[1] ?? '',
        ),
      )
      .filter((name) =>
        /^(calibration|campaign|campaign-sample|column-map|edition|loading|lot|member|method|reaction|rig|run|sample|site-count|upload)\./.test(
          name,
        ),
      ),
  )
  expect(actions.size).toBeGreaterThan(30)
  expect([...actions].filter((action) => actionWords(action) === action.replaceAll(/[.-]/g, ' '))).toEqual([])
})

test('what is not known yet is shown by its name', () => {
  expect(actionWords('thing.do-it')).toBe('thing do it')
})
