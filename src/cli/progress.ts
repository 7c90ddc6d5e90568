// A bar on a terminal for work that takes long; nothing anywhere else.
import { Presets, SingleBar } from 'cli-progress'

export interface Progress {
  readonly update: (done: number) => void
  readonly stop: () => void
}

/** A bar from 0 to `total` on standard error, from the moment the work has taken half a second. */
export function startProgress(label: string, total: number): Progress {
  if (!process.stderr.isTTY) return { update: () => undefined, stop: () => undefined }
  const format = `${label} {bar} {percentage} %`
  const bar = new SingleBar({ stream: process.stderr, clearOnComplete: true, hideCursor: null, format }, Presets.shades_classic)
  const began = Date.now()
  let shown = false
  return {
    update: (done) => {
      if (!shown && Date.now() - began > 500) {
        bar.start(total, done)
        shown = true
      } else if (shown) bar.update(done)
    },
    stop: () => {
      if (shown) bar.stop()
    },
  }
}
