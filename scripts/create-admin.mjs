// Makes an admin while the server is stopped: node scripts/create-admin.mjs --email name@laboratory.example [--name "Full Name"]
// The password is asked for; from a pipe it is read as the first line. It never stands in the command itself.
import { spawnSync } from 'node:child_process'

const done = spawnSync(
  process.execPath,
  ['--conditions=react-server', '--import', 'tsx', 'scripts/create-admin.ts', ...process.argv.slice(2)],
  { stdio: 'inherit' },
)
process.exit(done.status ?? 1)
