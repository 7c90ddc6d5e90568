// The audio wrapper, loaded when a hand comes near: the page can be read and edited before it can sound. Once it is there, a press finds it at
// once; a press that comes before waits for it, which the browser's memory of the press outlasts.
type Wrapper = typeof import('standardized-audio-context')

let loaded: Wrapper | null = null
let loading: Promise<Wrapper> | null = null

/** The wrapper if it has arrived. */
export const wrapper = (): Wrapper | null => loaded

export function loadWrapper(): Promise<Wrapper> {
  loading ??= import('standardized-audio-context').then(
    (arrived) => {
      loaded = arrived
      return arrived
    },
    (error: unknown) => {
      // Tried again at the next press: the network may be back.
      loading = null
      throw error
    },
  )
  return loading
}
