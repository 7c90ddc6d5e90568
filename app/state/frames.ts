// The one animation-frame loop. Plots, meters and moving values register here instead of asking for frames
// themselves, so that what a frame costs can be seen in one place. It sleeps while nobody listens.

export type FrameTask = (timeMs: number) => void

/**
 * Canvases draw first: text on a canvas makes the browser lay out what the page has changed before it. They take turns, one a
 * frame, so that two of them cost no more than one: each still moves 30 times a second.
 */
export type FramePhase = 'canvas' | 'page'

const tasks: Readonly<Record<FramePhase, Set<FrameTask>>> = { canvas: new Set(), page: new Set() }
let handle = 0
let turn = 0

function run(timeMs: number) {
  handle = tasks.canvas.size + tasks.page.size > 0 ? requestAnimationFrame(run) : 0
  turn += 1
  const canvases = [...tasks.canvas]
  canvases[turn % Math.max(1, canvases.length)]?.(timeMs)
  for (const task of tasks.page) task(timeMs)
}

/** Runs `task` once a frame (a canvas: on its turns) until the returned function is called. */
export function onFrame(task: FrameTask, phase: FramePhase = 'page'): () => void {
  tasks[phase].add(task)
  if (handle === 0) handle = requestAnimationFrame(run)
  return () => {
    tasks[phase].delete(task)
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
