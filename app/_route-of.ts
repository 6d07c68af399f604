import { type Route } from 'next'

/** A path of ours that is known only while running, for functions that take routes known at build time. Checked by the caller. */
export function routeOf(path: string): Route {
  return path as Route
}
