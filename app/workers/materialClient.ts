// The page's way to the material worker, made on first use.
import type { FromMaterialWorker, MaterialReply, MaterialRequest, ToMaterialWorker } from './materialProtocol.ts'

let worker: Worker | null = null
let nextId = 1
const waiting = new Map<number, (reply: MaterialReply) => void>()

/** One answer, refusals included. Never rejects. */
export function askMaterial(request: MaterialRequest): Promise<MaterialReply> {
  worker ??= open()
  const message: ToMaterialWorker = { id: nextId++, request }
  const transfer = request.kind === 'decoded' ? request.channels.map((samples) => samples.buffer as ArrayBuffer) : []
  return new Promise((resolve) => {
    waiting.set(message.id, resolve)
    worker?.postMessage(message, transfer)
  })
}

function open(): Worker {
  const made = new Worker(new URL('./material.worker.ts', import.meta.url), { type: 'module' })
  made.onmessage = ({ data }: MessageEvent<FromMaterialWorker>) => {
    waiting.get(data.id)?.(data.reply)
    waiting.delete(data.id)
  }
  // A worker that died (out of memory) is replaced at the next request; what it was doing is refused.
  made.onerror = (event) => {
    event.preventDefault()
    made.terminate()
    worker = null
    const reason = event.message || 'the worker stopped'
    for (const resolve of waiting.values()) resolve({ ok: false, code: 'worker', reason, hint: 'try again, or choose a shorter recording' })
    waiting.clear()
  }
  return made
}
