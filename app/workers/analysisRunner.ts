// Runs the worker's jobs one after another, in slices, so that a message (a cancellation, the next request) is heard
// between them. Knows neither the jobs nor the worker's globals.

/** A short job answers at once; a long one yields between slices and returns its answer. */
export type SlicedJob<Request, Reply> = (request: Request) => Reply | Generator<undefined, Reply>

export type ToWorker =
  | { readonly type: 'run'; readonly id: number; readonly kind: string; readonly request: unknown }
  | { readonly type: 'cancel'; readonly id: number }

export type FromWorker =
  | { readonly id: number; readonly ok: true; readonly value: unknown }
  | { readonly id: number; readonly ok: false; readonly message: string }

export interface RunnerParts {
  readonly jobs: Readonly<Record<string, SlicedJob<never, unknown>>>
  post(message: FromWorker): void
  /** Calls back after messages that are waiting have been heard. */
  later(turn: () => void): void
  now(): number
}

/** A slice is kept under this, so that nothing waits longer behind a long job than a frame and a half. */
const SLICE_MS = 12

interface Running {
  readonly id: number
  readonly kind: string
  readonly request: unknown
  steps: Iterator<undefined, unknown> | null
}

export function createRunner({ jobs, post, later, now }: RunnerParts): (message: ToWorker) => void {
  const queue: Running[] = []
  let scheduled = false

  function schedule() {
    if (scheduled || queue.length === 0) return
    scheduled = true
    later(turn)
  }

  function turn() {
    scheduled = false
    const job = queue[0]
    if (!job) return
    try {
      const done = advance(job)
      if (done) {
        queue.shift()
        post({ id: job.id, ok: true, value: done.value })
      }
    } catch (error) {
      queue.shift()
      post({ id: job.id, ok: false, message: error instanceof Error ? error.message : String(error) })
    }
    schedule()
  }

  function advance(job: Running): { readonly value: unknown } | null {
    if (job.steps === null) {
      const run = jobs[job.kind] as SlicedJob<unknown, unknown> | undefined
      if (!run) throw new RangeError(`no job is called ${job.kind}`)
      const begun = run(job.request)
      if (!isSteps(begun)) return { value: begun }
      job.steps = begun
    }
    const end = now() + SLICE_MS
    do {
      const step = job.steps.next()
      if (step.done) return { value: step.value }
    } while (now() < end)
    return null
  }

  return (message) => {
    if (message.type === 'run') queue.push({ id: message.id, kind: message.kind, request: message.request, steps: null })
    else {
      const at = queue.findIndex((job) => job.id === message.id)
      if (at >= 0) queue.splice(at, 1)
    }
    schedule()
  }
}

function isSteps(value: unknown): value is Iterator<undefined, unknown> {
  return typeof value === 'object' && value !== null && Symbol.iterator in value && 'next' in value
}
