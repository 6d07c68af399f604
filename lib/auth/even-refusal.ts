import 'server-only'

const TICK_MS = 500

/**
 * Lets every refusal arrive on a coarse tick after the attempt began, so that what was looked up, counted or written on
 * the way, a few milliseconds here and there, says nothing about whether the name exists. A success is not held up.
 */
export async function refuseEvenly<T>(work: () => Promise<T>, tickMs = TICK_MS): Promise<T> {
  const began = performance.now()
  try {
    return await work()
  } catch (error) {
    const elapsed = performance.now() - began
    await new Promise((done) => setTimeout(done, Math.ceil(elapsed / tickMs) * tickMs - elapsed))
    throw error
  }
}
