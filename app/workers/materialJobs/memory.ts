// The sound that plays, kept for measuring. Only the newest is: one recording may take 256 MiB. Where memory can be shared, the processor
// reads the same samples; elsewhere it gets a copy.
import type { Material, MaterialReply } from '../materialProtocol.ts'

/** A material that has no number yet. */
export type Made = Omit<Material, 'memory' | 'overview'>

let nextMemory = 1
let kept: Material | null = null

const COLUMNS = 1024

export function keep(made: Made): MaterialReply {
  const { channels, ...rest } = made
  const own = channels.map(shareable)
  kept = { ...rest, channels: own, memory: nextMemory++, overview: overviewOf(own, made.rate) }
  return { ok: true, material: { ...kept, channels: own.map(forProcessor) } }
}

/** The sound with this number, null when a newer one took its place. */
export function keptMaterial(memory: number): Material | null {
  return kept?.memory === memory ? kept : null
}

const canShare = () =>
  typeof SharedArrayBuffer === 'function' && (globalThis as { crossOriginIsolated?: boolean }).crossOriginIsolated === true

function shareable(samples: Float32Array): Float32Array {
  if (!canShare()) return samples
  const shared = new Float32Array(new SharedArrayBuffer(samples.byteLength))
  shared.set(samples)
  return shared
}

const forProcessor = (samples: Float32Array): Float32Array => (canShare() ? samples : samples.slice())

/** Smallest and largest sample of each of 1,024 columns, all channels together. */
export function overviewOf(channels: readonly Float32Array[], rate: number): Material['overview'] {
  const frames = channels[0]?.length ?? 0
  const columns = Math.max(1, Math.min(COLUMNS, frames))
  const min = new Float32Array(columns)
  const max = new Float32Array(columns)
  for (let column = 0; column < columns; column++) {
    const from = Math.floor((column * frames) / columns)
    const to = Math.floor(((column + 1) * frames) / columns)
    for (const samples of channels) {
      for (let i = from; i < to; i++) {
        const x = samples[i] as number
        if (x < (min[column] as number)) min[column] = x
        if (x > (max[column] as number)) max[column] = x
      }
    }
  }
  return { min, max, seconds: frames / rate }
}
