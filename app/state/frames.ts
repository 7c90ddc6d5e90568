// The one animation-frame loop. Plots, meters and moving values register here instead of asking for frames
// themselves, so that a frame's work is one number that can be measured. It sleeps while nobody listens.

export type FrameTask = (timeMs: number) => void

const tasks = new Set<FrameTask>()
let handle = 0

/** Main-thread work of the last 1,024 frames, ms; ring, newest at (count − 1) % length. For the benchmark. */
export const frameWork = { ms: new Float64Array(1024), count: 0 }

function run(timeMs: number) {
  handle = tasks.size > 0 ? requestAnimationFrame(run) : 0
  const start = performance.now()
  for (const task of tasks) task(timeMs)
  // uPlot draws in a microtask that a task queued before this one: two turns later its drawing and hooks are done.
  queueMicrotask(() => queueMicrotask(() => record(performance.now() - start)))
}

function record(ms: number) {
  frameWork.ms[frameWork.count % frameWork.ms.length] = ms
  frameWork.count += 1
}

/** Runs `task` once a frame until the returned function is called. */
export function onFrame(task: FrameTask): () => void {
  tasks.add(task)
  if (handle === 0) handle = requestAnimationFrame(run)
  return () => {
    tasks.delete(task)
  }
}

/** Runs `task` soon and then once a second, in a frame. */
export function everySecond(task: () => void): () => void {
  let due = Number.NEGATIVE_INFINITY
  return onFrame((timeMs) => {
    if (timeMs < due) return
    due = timeMs + 1000
    task()
  })
}
