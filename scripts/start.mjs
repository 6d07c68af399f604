// `npm start`: serves the built application. HOST and PORT say where; without HOST only this machine is answered.
import { existsSync } from 'node:fs'
import http from 'node:http'
import path from 'node:path'
import { pathToFileURL } from 'node:url'

const root = path.resolve(import.meta.dirname, '..')
process.chdir(root)
if (!existsSync('.next/BUILD_ID')) {
  console.error('There is no build yet. Run `npm run build` first (or `npm run demo`, which does it all).')
  process.exit(1)
}

const host = process.env.HOST || '127.0.0.1'
const port = process.env.PORT || '3000'
if (!/^\d{1,5}$/.test(port) || Number(port) > 65_535) {
  console.error(`PORT is "${port}"; it has to be a number up to 65535.`)
  process.exit(1)
}
process.env.NODE_ENV = 'production'
process.env.NEXT_TELEMETRY_DISABLED ||= '1'
process.env.APP_ORIGIN ||= `http://localhost:${port}`
process.umask(0o077)

// On SIGTERM the requests under way are finished and the database is closed before the process ends (instrumentation-node.ts). For that the
// framework's own handling is switched off and its server is kept where the start-up code finds it.
process.env.NEXT_MANUAL_SIG_HANDLE = 'true'
const createServer = http.createServer
http.createServer = (...parameters) => {
  const server = createServer(...parameters)
  globalThis[Symbol.for('inverse-kelvin.http-server')] ??= server
  return server
}

process.argv = [process.execPath, 'next', 'start', '-H', host, '-p', port]
await import(pathToFileURL(path.join(root, 'node_modules/next/dist/bin/next')).href)
