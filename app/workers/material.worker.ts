// Entry of the material worker: makes, reads, keeps and measures what is played.
import { materialFrom, readWavFile } from './materialJobs/decode.ts'
import { measureEqualLoudness } from './materialJobs/equalLoudness.ts'
import { keep } from './materialJobs/memory.ts'
import { renderPhrase } from './materialJobs/phrase.ts'
import type { FromMaterialWorker, MaterialReply, MaterialRequest, ToMaterialWorker } from './materialProtocol.ts'

let newestMeasurement = 0

async function answer(id: number, request: MaterialRequest): Promise<MaterialReply> {
  switch (request.kind) {
    case 'phrase':
      return keep(renderPhrase(request.phrase, request.rate))
    case 'wav': {
      const read = await readWavFile(request.file, request.rate)
      return 'ok' in read ? read : keep(read)
    }
    case 'decoded':
      return keep(materialFrom(request.channels, request.rate))
    case 'measure':
      newestMeasurement = id
      return measureEqualLoudness(request, () => newestMeasurement !== id)
  }
}

addEventListener('message', async ({ data: { id, request } }: MessageEvent<ToMaterialWorker>) => {
  let reply: MaterialReply
  try {
    reply = await answer(id, request)
  } catch (error) {
    const reason = error instanceof Error ? error.message : String(error)
    reply = { ok: false, code: 'failed', reason, hint: 'choose a shorter recording, or one at the set’s rate' }
  }
  const message: FromMaterialWorker = { id, reply }
  const transfer =
    reply.ok && 'material' in reply
      ? reply.material.channels.map((samples) => samples.buffer).filter((buffer): buffer is ArrayBuffer => buffer instanceof ArrayBuffer)
      : []
  postMessage(message, { transfer })
})
