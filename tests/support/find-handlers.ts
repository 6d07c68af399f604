import { readdirSync } from 'node:fs'
import path from 'node:path'
import { pathToFileURL } from 'node:url'

const ROOT = path.resolve(import.meta.dirname, '../..')
const METHODS = ['GET', 'HEAD', 'POST', 'PUT', 'PATCH', 'DELETE'] as const

export interface FoundFunction {
  /** method or name of the action, and its file */
  readonly name: string
  readonly file: string
  readonly call: (...given: unknown[]) => Promise<unknown>
}
export interface FoundHandler extends FoundFunction {
  readonly method: (typeof METHODS)[number]
  /** names of the parts of its address that stand for something: `runId` */
  readonly parameters: readonly string[]
}

const files = () =>
  readdirSync(path.join(ROOT, 'app'), { recursive: true, encoding: 'utf8' })
    .map((name) => `app/${name}`)
    .sort()

async function functionsOf(file: string): Promise<(FoundFunction & { exportedAs: string })[]> {
  const exported: Record<string, unknown> = await import(pathToFileURL(path.join(ROOT, file)).href)
  return Object.entries(exported).flatMap(([exportedAs, value]) =>
    typeof value === 'function'
      ? [
          {
            name: `${exportedAs} ${file}`,
            exportedAs,
            file,
            call: async (...given: unknown[]) => Reflect.apply(value, undefined, given),
          },
        ]
      : [],
  )
}

/** Every handler of the application, found by its file. */
export async function findHandlers(): Promise<FoundHandler[]> {
  const found: FoundHandler[] = []
  for (const file of files().filter((name) => name.endsWith('/route.ts')))
    for (const { exportedAs, ...one } of await functionsOf(file)) {
      const method = METHODS.find((name) => name === exportedAs)
      const parameters = [...file.matchAll(/\[(\w+)\]/g)].map(([, name = '']) => name)
      if (method !== undefined) found.push({ ...one, method, parameters })
    }
  return found
}

/** Every action of the application, found by its file. */
export async function findActions(): Promise<FoundFunction[]> {
  const found: FoundFunction[] = []
  for (const file of files().filter((name) => name.endsWith('actions.ts'))) found.push(...(await functionsOf(file)))
  return found
}
