// WAV files made byte by byte, so that a test can get one thing wrong at a time.

export interface WavSpec {
  readonly tag?: number
  readonly channels?: number
  readonly rate?: number
  readonly bits?: number
  readonly frameBytes?: number
  readonly data?: readonly number[]
  /** The size written for the data chunk; the true one by default. */
  readonly dataSize?: number
  /** Sub-format tag: makes the format extensible. */
  readonly extensible?: number
  readonly validBits?: number
}

export const ascii = (s: string): number[] => [...s].map((c) => c.charCodeAt(0))
export const u16 = (n: number): number[] => [n & 0xff, (n >> 8) & 0xff]
export const u32 = (n: number): number[] => [n & 0xff, (n >>> 8) & 0xff, (n >>> 16) & 0xff, (n >>> 24) & 0xff]
export const chunk = (id: string, body: readonly number[], size = body.length): number[] => [
  ...ascii(id),
  ...u32(size),
  ...body,
  ...(body.length % 2 ? [0] : []),
]
export const riff = (...chunks: readonly (readonly number[])[]): Uint8Array => {
  const body = [...ascii('WAVE'), ...chunks.flat()]
  return Uint8Array.from([...ascii('RIFF'), ...u32(body.length), ...body])
}

export function fmt(spec: WavSpec = {}): number[] {
  const { tag = 1, channels = 1, rate = 48000, bits = 16, extensible } = spec
  const frameBytes = spec.frameBytes ?? (channels * bits) / 8
  const plain = [
    ...u16(extensible === undefined ? tag : 0xfffe),
    ...u16(channels),
    ...u32(rate),
    ...u32(rate * frameBytes),
    ...u16(frameBytes),
    ...u16(bits),
  ]
  if (extensible === undefined) return chunk('fmt ', plain)
  const guid = [...u16(extensible), 0, 0, 0, 0, 0x10, 0, 0x80, 0, 0, 0xaa, 0, 0x38, 0x9b, 0x71]
  return chunk('fmt ', [...plain, ...u16(22), ...u16(spec.validBits ?? bits), ...u32(3), ...guid])
}

export function wavBytes(spec: WavSpec = {}): Uint8Array {
  const data = spec.data ?? [1, 0, 2, 0]
  return riff(fmt(spec), chunk('data', data, spec.dataSize ?? data.length))
}
