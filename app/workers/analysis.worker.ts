// Entry of the analysis workers: joins the jobs to the worker's messages. Numbers go back as transferred buffers.
import { ANALYSIS_JOBS } from './analysisJobs.ts'
import { createRunner, type FromWorker, type ToWorker } from './analysisRunner.ts'

interface Scope {
  postMessage(message: FromWorker, transfer: Transferable[]): void
  onmessage: ((event: MessageEvent<ToWorker>) => void) | null
}

const scope = self as unknown as Scope
// A message to ourselves comes after those already waiting, and sooner than a timer.
const turns = new MessageChannel()

const hear = createRunner({
  jobs: ANALYSIS_JOBS,
  post: (message) => scope.postMessage(message, []),
  later: (turn) => {
    turns.port2.onmessage = turn
    turns.port1.postMessage(null)
  },
  now: () => performance.now(),
})

scope.onmessage = (event) => hear(event.data)
