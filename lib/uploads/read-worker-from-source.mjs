// Starts the reading thread where sources run as they stand, in tests and scripts: the loader is registered in the thread itself, which does
// not inherit its parent's. The build never comes here.
import { register as registerRequire } from 'tsx/cjs/api'
import { register } from 'tsx/esm/api'

// the package is none of modules, so Node hands its sources to `require`, whose loader is the other one
registerRequire()
register()
await import('./read-worker.ts')
