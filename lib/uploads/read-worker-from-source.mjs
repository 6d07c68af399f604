// Starts the reading thread where sources run as they stand, in tests and scripts: the loader is registered in the thread itself, which does
// not inherit its parent's. The build never comes here.
import { register } from 'tsx/esm/api'

register()
await import('./read-worker.ts')
