// The page's one way to the analysis workers. A feed asks again and again for the same kind of figure: at most one
// request is under way, of those that come meanwhile only the latest is kept, and replies after stop() are dropped.
// Three workers of one script: `live` answers every frame, `slow` takes what may last (the whole sweep, the checks), `long` what takes seconds.
import type { JobKind, JobProgress, JobReply, JobRequest } from './analysisProtocol.ts'
import { LANE, type Lane } from './analysisProtocol.ts'
import type { FromWorker, ToWorker } from './analysisRunner.ts'

export interface Feed<K extends JobKind> {
  ask(request: JobRequest<K>): void
  /** Drops what is under way and waiting, between two of its steps, and asks for this instead. */
  askInstead(request: JobRequest<K>): void
  /** Drops what is under way and waiting; the feed may ask again later. */
  stop(): void
}

type Answer = (reply: FromWorker) => void

/** What a lane needs of a Worker. */
export interface WorkerLike {
  postMessage(message: ToWorker): void
  terminate(): void
  onmessage: ((event: MessageEvent) => void) | null
  onerror: ((event: ErrorEvent) => void) | null
}

/** A job that is under way this long while a newer request of its feed waits is abandoned with its worker. */
const PATIENCE_MS = 4000

interface Sent {
  readonly message: ToWorker & { readonly type: 'run' }
  readonly answer: Answer
}

export interface AnalysisClient {
  openFeed<K extends JobKind>(
    kind: K,
    onReply: (reply: JobReply<K>, request: JobRequest<K>) => void,
    onFailure?: OnFailure,
    onProgress?: (progress: JobProgress<K>, request: JobRequest<K>) => void,
  ): Feed<K>
}

export type OnFailure = (message: string) => void

export function createAnalysisClient(makeWorker: (lane: Lane) => WorkerLike): AnalysisClient {
  const lane = (name: Lane) => createLane(() => makeWorker(name))
  const lanes: Record<Lane, LaneOfWork> = { live: lane('live'), slow: lane('slow'), long: lane('long') }

  function openFeed<K extends JobKind>(
    kind: K,
    onReply: (reply: JobReply<K>, request: JobRequest<K>) => void,
    onFailure: OnFailure = () => {},
    onProgress: (progress: JobProgress<K>, request: JobRequest<K>) => void = () => {},
  ): Feed<K> {
    const lane = lanes[LANE[kind]]
    let underWay = 0
    let startedMs = 0
    let waiting: JobRequest<K> | null = null
    let impatience: ReturnType<typeof setTimeout> | undefined

    function send(request: JobRequest<K>) {
      startedMs = Date.now()
      underWay = lane.send(kind, request, (reply) => {
        if (reply.ok && 'progress' in reply) {
          onProgress(reply.progress as JobProgress<K>, request)
          return
        }
        underWay = 0
        clearTimeout(impatience)
        impatience = undefined
        const next = waiting
        waiting = null
        if (next !== null) send(next)
        if (reply.ok) onReply(reply.value as JobReply<K>, request)
        else onFailure(reply.message)
      })
    }

    function abandon() {
      impatience = undefined
      const next = waiting
      if (underWay === 0 || next === null) return
      lane.replace(underWay)
      underWay = 0
      waiting = null
      send(next)
    }

    function stop() {
      if (underWay !== 0) lane.cancel(underWay)
      underWay = 0
      waiting = null
      clearTimeout(impatience)
      impatience = undefined
    }

    return {
      ask(request) {
        if (underWay === 0) {
          send(request)
          return
        }
        waiting = request
        impatience ??= setTimeout(abandon, Math.max(0, startedMs + PATIENCE_MS - Date.now()))
      },
      askInstead(request) {
        stop()
        send(request)
      },
      stop,
    }
  }

  return { openFeed }
}

interface LaneOfWork {
  send(kind: string, request: unknown, answer: Answer): number
  cancel(id: number): void
  /** Ends the worker with the job `id` in it; the others' jobs are given to a fresh one. */
  replace(id: number): void
}

function createLane(makeWorker: () => WorkerLike): LaneOfWork {
  const sent = new Map<number, Sent>()
  let worker: WorkerLike | null = null
  let lastId = 0

  function started(): WorkerLike {
    if (worker) return worker
    const made = makeWorker()
    made.onmessage = (event: MessageEvent<FromWorker>) => {
      const { data } = event
      const entry = sent.get(data.id)
      if (!data.ok || 'value' in data) sent.delete(data.id)
      entry?.answer(data)
    }
    made.onerror = (event) => {
      const message = event.message || 'the analysis worker could not be started'
      const all = [...sent.entries()]
      sent.clear()
      made.terminate()
      worker = null
      for (const [id, { answer }] of all) answer({ id, ok: false, message })
    }
    worker = made
    return made
  }

  return {
    send(kind, request, answer) {
      lastId += 1
      const message = { type: 'run', id: lastId, kind, request } as const
      sent.set(lastId, { message, answer })
      started().postMessage(message)
      return lastId
    },
    cancel(id) {
      if (sent.delete(id)) started().postMessage({ type: 'cancel', id })
    },
    replace(id) {
      sent.delete(id)
      worker?.terminate()
      worker = null
      for (const { message } of sent.values()) started().postMessage(message)
    },
  }
}

function pageWorker(lane: Lane): WorkerLike {
  return new Worker(new URL('./analysis.worker.ts', import.meta.url), { type: 'module', name: `analysis ${lane}` })
}

let client: AnalysisClient | null = null

/** The page's client, made on first use; its workers start with the first request. */
export function analysis(): AnalysisClient {
  client ??= createAnalysisClient(pageWorker)
  return client
}
