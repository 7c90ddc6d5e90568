// Ctrl-C while a file is being made: what was begun is cleared away first, then the process ends by the same signal, as a shell expects.

const SIGNALS = ['SIGINT', 'SIGTERM', 'SIGHUP'] as const

/** Runs `work` with a signal that a user's interruption aborts; work must look at it wherever it may take long. Does not return when interrupted. */
export async function interruptible<T>(work: (signal: AbortSignal) => Promise<T>): Promise<T> {
  const controller = new AbortController()
  let received: NodeJS.Signals | undefined
  const listener = (name: NodeJS.Signals) => {
    received = name
    controller.abort()
  }
  for (const name of SIGNALS) process.on(name, listener)
  try {
    return await work(controller.signal)
  } finally {
    for (const name of SIGNALS) process.off(name, listener)
    if (received) await endBy(received)
  }
}

async function endBy(name: NodeJS.Signals): Promise<never> {
  process.kill(process.pid, name)
  // The signal arrives between turns of the event loop; nothing may run on meanwhile.
  return new Promise<never>(() => setInterval(() => undefined, 1000))
}
