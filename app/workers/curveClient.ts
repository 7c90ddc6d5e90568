// The Curve plot's way to its worker: one request under way, of those that come meanwhile only the latest is kept.
import type { CurveReply, CurveRequest } from './curveJob.ts'

export interface CurveFeed {
  ask(request: CurveRequest): void
  stop(): void
}

export function openCurveFeed(onReply: (reply: CurveReply) => void, onFailure: (message: string) => void): CurveFeed {
  let worker: Worker | null = null
  let busy = false
  let waiting: CurveRequest | null = null

  function started(): Worker {
    if (worker) return worker
    const made = new Worker(new URL('./curve.worker.ts', import.meta.url), { type: 'module', name: 'curve' })
    made.onmessage = ({ data }: MessageEvent<CurveReply>) => {
      busy = false
      const next = waiting
      waiting = null
      if (next) send(next)
      onReply(data)
    }
    made.onerror = (event) => {
      stop()
      onFailure(event.message || 'its worker could not be started')
    }
    worker = made
    return made
  }

  function send(request: CurveRequest) {
    busy = true
    started().postMessage(request)
  }

  function stop() {
    worker?.terminate()
    worker = null
    busy = false
    waiting = null
  }

  return {
    ask(request) {
      if (busy) waiting = request
      else send(request)
    },
    stop,
  }
}
