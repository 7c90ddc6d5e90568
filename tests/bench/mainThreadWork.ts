// Work of a page's main thread between its animation frames, from a trace of the browser's own.

export interface TraceEvent {
  readonly name: string
  readonly ph: string
  readonly pid: number
  readonly tid: number
  /** µs */
  readonly ts: number
  readonly dur?: number
  /** µs of processor time, where the platform measures it. */
  readonly tdur?: number
}

export interface FrameWork {
  /** Processor time of all tasks from one frame's task to the next, ms. */
  readonly cpuMs: readonly number[]
  /** The same by the clock: on a busy machine, others' time included. */
  readonly clockMs: readonly number[]
  /** Time from frame to frame, ms. */
  readonly apartMs: readonly number[]
}

/** Categories to trace for it. */
export const TRACED = ['toplevel', 'devtools.timeline', 'disabled-by-default-devtools.timeline']

const TASK = /^(RunTask|ThreadControllerImpl::RunTask)$/

/** Of the thread that fired most animation frames. */
export function frameWork(events: readonly TraceEvent[]): FrameWork {
  const fired = events.filter((event) => event.name === 'FireAnimationFrame')
  const thread = mostOften(fired.map(({ pid, tid }) => `${pid} ${tid}`))
  const own = events.filter(({ pid, tid }) => `${pid} ${tid}` === thread)
  const named = own.filter((event) => event.ph === 'X' && TASK.test(event.name))
  // A browser may trace a task under both names: one of them counts.
  const [{ name } = { name: '' }] = named
  const tasks = named.filter((event) => event.name === name).sort((a, b) => a.ts - b.ts)
  const frames = tasks.filter((task) =>
    fired.some((frame) => `${frame.pid} ${frame.tid}` === thread && frame.ts >= task.ts && frame.ts < task.ts + (task.dur ?? 0)),
  )
  const sums = { cpuMs: [] as number[], clockMs: [] as number[], apartMs: [] as number[] }
  frames.slice(0, -1).forEach((frame, i) => {
    const next = frames[i + 1]?.ts ?? 0
    const within = tasks.filter(({ ts }) => ts >= frame.ts && ts < next)
    sums.cpuMs.push(within.reduce((sum, task) => sum + (task.tdur ?? task.dur ?? 0), 0) / 1000)
    sums.clockMs.push(within.reduce((sum, task) => sum + (task.dur ?? 0), 0) / 1000)
    sums.apartMs.push((next - frame.ts) / 1000)
  })
  return sums
}

function mostOften(keys: readonly string[]): string {
  const counts = new Map<string, number>()
  for (const key of keys) counts.set(key, (counts.get(key) ?? 0) + 1)
  return [...counts].sort((a, b) => b[1] - a[1])[0]?.[0] ?? ''
}

/** The value that a part of the values does not exceed; part in (0, 1]. */
export function quantile(values: readonly number[], part: number): number {
  if (values.length === 0) throw new RangeError('a quantile needs values, got none')
  const sorted = [...values].sort((a, b) => a - b)
  return sorted[Math.min(sorted.length - 1, Math.ceil(part * sorted.length) - 1)] as number
}
