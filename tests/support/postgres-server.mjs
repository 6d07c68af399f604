// Starts a PostgreSQL server of its own in a folder that goes away again, and runs a command with TEST_DATABASE_URL set to it:
//   node tests/support/postgres-server.mjs npx vitest run --project integration
// Uses Debian's package `postgresql`; installs it where it can, else says that it skips.
import { execFileSync, spawn, spawnSync } from 'node:child_process'
import { chownSync, existsSync, mkdtempSync, readdirSync, rmSync } from 'node:fs'
import net from 'node:net'
import { tmpdir, userInfo } from 'node:os'
import path from 'node:path'
import { pathToFileURL } from 'node:url'

/** The oldest version the product promises to run on is 15; the newest one found is used unless POSTGRES_BIN says otherwise. */
function findBinaries() {
  if (process.env.POSTGRES_BIN) return process.env.POSTGRES_BIN
  const root = '/usr/lib/postgresql'
  if (!existsSync(root)) return null
  const versions = readdirSync(root)
    .filter((name) => Number(name) >= 15 && existsSync(path.join(root, name, 'bin/initdb')))
    .sort((a, b) => Number(b) - Number(a))
  return versions[0] ? path.join(root, versions[0], 'bin') : null
}

function install() {
  if (userInfo().uid !== 0 || spawnSync('apt-get', ['--version']).error) return
  console.log('PostgreSQL is not installed; trying to install it.')
  const quiet = { stdio: 'ignore', env: { ...process.env, DEBIAN_FRONTEND: 'noninteractive' }, timeout: 240_000 }
  const arguments_ = ['install', '-y', '--no-install-recommends', 'postgresql']
  if (spawnSync('apt-get', arguments_, quiet).status === 0) return
  spawnSync('apt-get', ['update'], quiet)
  spawnSync('apt-get', arguments_, quiet)
}

function freePort() {
  return new Promise((resolve, reject) => {
    const server = net.createServer()
    server.once('error', reject)
    server.listen(0, '127.0.0.1', () => {
      const { port } = server.address()
      server.close(() => resolve(port))
    })
  })
}

/** The server refuses to run as root: then it runs as the package's own user, or as nobody. */
function ordinaryUser() {
  if (userInfo().uid !== 0) return {}
  for (const name of ['postgres', 'nobody']) {
    const uid = spawnSync('id', ['-u', name], { encoding: 'utf8' })
    const gid = spawnSync('id', ['-g', name], { encoding: 'utf8' })
    if (uid.status === 0 && gid.status === 0) return { uid: Number(uid.stdout), gid: Number(gid.stdout) }
  }
  return null
}

/** @returns {Promise<{ url: string, version: string, stop: () => void } | { skipped: string }>} */
export async function startPostgresServer() {
  if (!findBinaries()) install()
  const binaries = findBinaries()
  if (!binaries)
    return { skipped: 'PostgreSQL 15 or newer (Debian package "postgresql") is not installed and could not be.' }
  const user = ordinaryUser()
  if (!user) return { skipped: 'PostgreSQL does not run as root, and there is no other user to run it as.' }
  const folder = mkdtempSync(path.join(tmpdir(), 'postgres-'))
  if (user.uid !== undefined) chownSync(folder, user.uid, user.gid)
  const options = {
    ...user,
    cwd: folder,
    stdio: ['ignore', 'ignore', 'pipe'],
    env: { PATH: process.env.PATH, LC_ALL: 'C.UTF-8', TZ: 'UTC' },
  }
  const data = path.join(folder, 'data')
  const port = await freePort()
  const stop = () => {
    spawnSync(path.join(binaries, 'pg_ctl'), ['-D', data, '-m', 'immediate', '-w', 'stop'], options)
    rmSync(folder, { recursive: true, force: true })
  }
  try {
    execFileSync(
      path.join(binaries, 'initdb'),
      ['-D', data, '-U', 'postgres', '-A', 'trust', '-E', 'UTF8', '--no-sync'],
      options,
    )
    const settings = `-p ${port} -h 127.0.0.1 -k ${folder} -c fsync=off -c max_connections=100 -c timezone=UTC`
    execFileSync(
      path.join(binaries, 'pg_ctl'),
      ['-D', data, '-w', '-t', '60', '-l', path.join(folder, 'log'), '-o', settings, 'start'],
      options,
    )
  } catch (error) {
    stop()
    return { skipped: `PostgreSQL could not be started: ${String(error.stderr ?? error.message).trim()}` }
  }
  const version = execFileSync(path.join(binaries, 'postgres'), ['--version'], { encoding: 'utf8' }).trim()
  return { url: `postgres://postgres@127.0.0.1:${port}/postgres`, version, stop }
}

/** Runs a command with a server beside it. Without one it says so and gives 0: what cannot run here is not a failure. */
export async function runWithPostgresServer(command, arguments_) {
  const server = await startPostgresServer()
  if ('skipped' in server) {
    console.log(`SKIPPED on a PostgreSQL server: ${server.skipped}`)
    return 0
  }
  console.log(`On a PostgreSQL server (${server.version}):`)
  try {
    const child = spawn(command, arguments_, {
      stdio: 'inherit',
      env: { ...process.env, TEST_DATABASE_URL: server.url },
    })
    const pass = (signal) => child.kill(signal)
    process.once('SIGINT', pass)
    process.once('SIGTERM', pass)
    return await new Promise((resolve, reject) => {
      child.once('error', reject)
      child.once('exit', (code) => resolve(code ?? 1))
    })
  } finally {
    server.stop()
  }
}

if (process.argv[1] && import.meta.url === pathToFileURL(process.argv[1]).href) {
  const [command, ...rest] = process.argv.slice(2)
  if (!command) throw new Error('name the command to run')
  process.exitCode = await runWithPostgresServer(command, rest)
}
