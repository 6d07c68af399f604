import { spawn, type ChildProcess } from 'node:child_process'
import { once } from 'node:events'
import { createInterface } from 'node:readline'

export interface Child {
  readonly process: ChildProcess
  /** what it said so far, line by line */
  readonly lines: string[]
  /** the first line that begins so, said already or yet to come; fails when the child ends without it */
  line(beginning: string): Promise<string>
  /** `kill -9`, and waits until it is gone */
  kill(): Promise<void>
  /** exit code once it has ended by itself and all it said was read */
  ended(): Promise<number | null>
}

/** Runs a program of the tests in a process of its own. */
export function startChild(file: string, ...parameters: string[]): Child {
  const child = spawn(process.execPath, ['--conditions=react-server', '--import', 'tsx', file, ...parameters], {
    stdio: ['ignore', 'pipe', 'pipe'],
    env: { ...process.env, TSX_DISABLE_CACHE: '' },
  })
  const lines: string[] = []
  const faults: string[] = []
  child.stderr.on('data', (data) => faults.push(String(data)))
  const reader = createInterface({ input: child.stdout })
  reader.on('line', (line) => lines.push(line))
  const closed = once(reader, 'close')
  const exited = once(child, 'exit')
  return {
    process: child,
    lines,
    async line(beginning) {
      const matches = (line: string) => line.startsWith(beginning)
      return new Promise((resolve, reject) => {
        const said = lines.find(matches)
        if (said !== undefined) return resolve(said)
        reader.on('line', (line) => matches(line) && resolve(line))
        void closed.then(() =>
          reject(new Error(`the child ended without saying "${beginning}"\n${lines.at(-1)}\n${faults.join('')}`)),
        )
      })
    },
    async kill() {
      child.kill('SIGKILL')
      await Promise.all([exited, closed])
    },
    async ended() {
      await Promise.all([exited, closed])
      return child.exitCode
    },
  }
}
