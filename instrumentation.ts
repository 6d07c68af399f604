/** Runs once when the server starts, before it answers anybody. */
export async function register(): Promise<void> {
  // The bundler has to see this name as it is, to leave the Node part out of other runtimes.
  // eslint-disable-next-line no-restricted-properties
  if (process.env.NEXT_RUNTIME === 'nodejs') await (await import('./instrumentation-node')).startServer()
}
