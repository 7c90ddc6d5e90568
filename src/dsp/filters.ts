// The two first-order filters of the path: one-pole low-pass (damping, wet high cut) and high-pass (low cut, wet low cut).
// Both take their coefficient from the matched pole exp(−2π f/fs); near fs/2 their true −3 dB points leave the nominal f.

/** a of the one-pole low-pass (1 − a)/(1 − a z⁻¹), unity at DC: exp(−2π hz/fs), in (0, 1). `hz` > 0, `fs` > 0, both in Hz. */
export function onePoleCoefficient(hz: number, fs: number): number {
  return Math.exp((-2 * Math.PI * hz) / fs)
}

/** b of the first-order high-pass (1 + b)/2 · (1 − z⁻¹)/(1 − b z⁻¹), unity at fs/2: exp(−2π hz/fs), in (0, 1). */
export function highPassCoefficient(hz: number, fs: number): number {
  return Math.exp((-2 * Math.PI * hz) / fs)
}

/** True −3 dB (half power) frequency in Hz of the one-pole low-pass: cos ω = (4a − 1 − a²)/(2a); null when it falls less than 3 dB up to fs/2. */
export function lowPassHalfPowerHz(hz: number, fs: number): number | null {
  const a = onePoleCoefficient(hz, fs)
  const cosine = (4 * a - 1 - a * a) / (2 * a)
  return cosine < -1 ? null : (Math.acos(Math.min(1, cosine)) * fs) / (2 * Math.PI)
}

/** True −3 dB (half power) frequency in Hz of the high-pass: cos ω = 2b/(1 + b²), always below fs/4. */
export function highPassHalfPowerHz(hz: number, fs: number): number {
  const b = highPassCoefficient(hz, fs)
  return (Math.acos((2 * b) / (1 + b * b)) * fs) / (2 * Math.PI)
}
