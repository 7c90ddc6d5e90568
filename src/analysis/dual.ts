// A complex value with its derivative by ω: [re, im, d re/dω, d im/dω], four numbers that are written in place.

export const dual = (): Float64Array => new Float64Array(4)

/** d ← 1, which does not change. */
export function setOne(d: Float64Array): void {
  d[0] = 1
  d[1] = 0
  d[2] = 0
  d[3] = 0
}

/** out ← a · b; out may be a or b. */
export function multiply(out: Float64Array, a: Float64Array, b: Float64Array): void {
  const ar = a[0] as number
  const ai = a[1] as number
  const br = b[0] as number
  const bi = b[1] as number
  const dr = ar * (b[2] as number) - ai * (b[3] as number) + (a[2] as number) * br - (a[3] as number) * bi
  const di = ar * (b[3] as number) + ai * (b[2] as number) + (a[2] as number) * bi + (a[3] as number) * br
  out[0] = ar * br - ai * bi
  out[1] = ar * bi + ai * br
  out[2] = dr
  out[3] = di
}

/** d ← 1/d. */
export function invert(d: Float64Array): void {
  const re = d[0] as number
  const im = d[1] as number
  const size = re * re + im * im
  const ir = re / size
  const ii = -im / size
  // (1/d)' = −d' / d²
  const sr = ir * ir - ii * ii
  const si = 2 * ir * ii
  const dr = d[2] as number
  const di = d[3] as number
  d[0] = ir
  d[1] = ii
  d[2] = -(dr * sr - di * si)
  d[3] = -(dr * si + di * sr)
}
