// Runs the worker's jobs in slices, in turns, so that a message (a cancellation, the next request) is heard between them and a short
// job waits for a slice of a long one, not for its end. Knows neither the jobs nor the worker's globals.

/** A short job answers at once; a long one yields between slices, how far it is where that is worth telling, and returns its answer. */
export type SlicedJob<Request, Reply, Progress = never> = (request: Request) => Reply | Generator<Progress | undefined, Reply>

/** A job whose code is fetched when it is first asked for. */
export interface FetchedJob<Request, Reply, Progress = never> {
  fetch(request: Request): Promise<SlicedJob<Request, Reply, Progress>>
  /** Where not every request needs the same code: a name for what this one needs. */
  part?(request: Request): string
}

export type ToWorker =
  | { readonly type: 'run'; readonly id: number; readonly kind: string; readonly request: unknown }
  | { readonly type: 'cancel'; readonly id: number }

export type FromWorker =
  | { readonly id: number; readonly ok: true; readonly value: unknown }
  | { readonly id: number; readonly ok: true; readonly progress: unknown }
  | { readonly id: number; readonly ok: false; readonly message: string }

export interface RunnerParts {
  readonly jobs: Readonly<Record<string, SlicedJob<never, unknown, unknown> | FetchedJob<never, unknown, unknown>>>
  post(message: FromWorker): void
  /** Calls back after messages that are waiting have been heard. */
  later(turn: () => void): void
  now(): number
}

/** A slice is kept under this, so that nothing waits longer behind a long job than a frame and a half. */
const SLICE_MS = 12
/** How far a job is, is told this often at most: the page has frames to draw. */
const TELL_MS = 100

interface Running {
  readonly id: number
  readonly kind: string
  /** Under which its code is kept once it is fetched. */
  readonly part: string
  readonly request: unknown
  steps: Iterator<unknown, unknown> | null
  toldMs: number
}

export function createRunner({ jobs, post, later, now }: RunnerParts): (message: ToWorker) => void {
  const queue: Running[] = []
  const fetching = new Set<number>()
  const fetched: Record<string, SlicedJob<unknown, unknown, unknown>> = {}
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
      queue.shift()
      const done = advance(job)
      if (done) post({ id: job.id, ok: true, value: done.value })
      else queue.push(job)
    } catch (error) {
      refuse(job.id, error)
    }
    schedule()
  }

  function advance(job: Running): { readonly value: unknown } | null {
    if (job.steps === null) {
      const begun = jobOf(job)(job.request)
      if (!isSteps(begun)) return { value: begun }
      job.steps = begun
      job.toldMs = now()
    }
    const end = now() + SLICE_MS
    let progress: unknown
    do {
      const step = job.steps.next()
      if (step.done) return { value: step.value }
      progress = step.value
    } while (now() < end)
    if (progress !== undefined && now() - job.toldMs >= TELL_MS) {
      job.toldMs = now()
      post({ id: job.id, ok: true, progress })
    }
    return null
  }

  function jobOf({ kind, part }: Running): SlicedJob<unknown, unknown, unknown> {
    const known = jobs[kind]
    const job = fetched[part] ?? (typeof known === 'function' ? (known as SlicedJob<unknown, unknown, unknown>) : undefined)
    if (!job) throw new RangeError(`no job is called ${kind}`)
    return job
  }

  function refuse(id: number, error: unknown) {
    post({ id, ok: false, message: error instanceof Error ? error.message : String(error) })
  }

  async function fetchFirst(job: Running, from: FetchedJob<never, unknown, unknown>) {
    fetching.add(job.id)
    try {
      fetched[job.part] ??= (await from.fetch(job.request as never)) as SlicedJob<unknown, unknown, unknown>
      if (fetching.delete(job.id)) queue.push(job)
      schedule()
    } catch (error) {
      if (fetching.delete(job.id)) refuse(job.id, error)
    }
  }

  return (message) => {
    if (message.type === 'cancel') {
      fetching.delete(message.id)
      const at = queue.findIndex((job) => job.id === message.id)
      if (at >= 0) queue.splice(at, 1)
      return
    }
    const { id, kind, request } = message
    const known = jobs[kind]
    const isFetched = known !== undefined && typeof known !== 'function'
    const part = isFetched && known.part ? `${kind} ${known.part(request as never)}` : kind
    const job: Running = { id, kind, part, request, steps: null, toldMs: 0 }
    if (isFetched && !fetched[part]) {
      void fetchFirst(job, known)
      return
    }
    queue.push(job)
    schedule()
  }
}

function isSteps(value: unknown): value is Iterator<unknown, unknown> {
  return typeof value === 'object' && value !== null && Symbol.iterator in value && 'next' in value
}
