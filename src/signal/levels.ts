// Level of a signal and decibels. Decibels here are 20 log10 of an amplitude; full scale is 1.

/** What silence reads in dB: |x| below 1e-20. Keeps −Infinity out of files and plots. */
export const DB_FLOOR = -400

/** 20 log10 |x|, held at `floor` from below (also for 0). NaN stays NaN. */
export function toDb(amplitude: number, floor = DB_FLOOR): number {
  return Math.max(floor, 20 * Math.log10(Math.abs(amplitude)))
}

/** 10^(dB/20). */
export function fromDb(db: number): number {
  return 10 ** (db / 20)
}

/** Largest |x[n]|; 0 for no samples. NaN when a sample is NaN. */
export function peak(x: Float64Array | Float32Array): number {
  let largest = 0
  for (let i = 0; i < x.length; i++) largest = Math.max(largest, Math.abs(x[i] as number))
  return largest
}

/** √(Σ x[n]² / N); 0 for no samples. A full-scale sine reads 1/√2 (−3.01 dB). */
export function rms(x: Float64Array | Float32Array): number {
  if (x.length === 0) return 0
  let sum = 0
  for (let i = 0; i < x.length; i++) sum += (x[i] as number) ** 2
  return Math.sqrt(sum / x.length)
}
