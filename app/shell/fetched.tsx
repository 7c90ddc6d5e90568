// A part of the page that opens in place and comes with its first use: no part of the first load.
import { type ComponentType, lazy } from 'react'

/** The part as a component for inside a Suspense; a sentence where it could not be fetched. */
export function fetched<P extends object>(load: () => Promise<ComponentType<P>>): ComponentType<P> {
  return lazy(() =>
    load().then(
      (part) => ({ default: part }),
      () => ({ default: NotFetched as ComponentType<P> }),
    ),
  )
}

const NotFetched = () => (
  <p role="alert">This part could not be fetched. Is the server it came from still running? Then load the page again.</p>
)
