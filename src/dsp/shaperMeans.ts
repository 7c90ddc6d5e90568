// The mean of a curve over an interval, (K(b) − K(a))/(b − a), which is what antiderivative anti-aliasing plays; without the cancellation of
// that difference, however short the interval.
//
// Numbers go in and out through a cell, for the reason given in shaperCurves.ts.
import { applyCurve, type CurveParameters, diodeVoltages } from './shaperCurves.ts'
import { arctanIntegrals, diodeIntegrals, drawnIntegral, tanhIntegrals } from './shaperIntegrals.ts'

/** [0] and [1]: the interval; [2]: its mean; the rest is scratch. */
export type MeanCell = Float64Array

export function createMeanCell(): MeanCell {
  return new Float64Array(6)
}

/** Mean of k over cell[0] to cell[1], 0 ≤ cell[0] ≤ cell[1], into cell[2]; the curve itself where they are equal. */
export function curveMean(p: CurveParameters, cell: MeanCell): void {
  if (p.curve === 'hardClip') hardClipMean(cell)
  else if (p.curve === 'cubic') cubicMean(cell)
  else if (p.curve === 'deadZone') deadZoneMean(p, cell)
  else if (p.curve === 'drawn') drawnMean(p, cell)
  else smoothMean(p, cell)
}

function hardClipMean(cell: MeanCell): void {
  const a = cell[0]!
  const b = cell[1]!
  if (b <= 1) cell[2] = (a + b) / 2
  else cell[2] = a >= 1 ? 1 : (((1 - a) * (1 + a)) / 2 + (b - 1)) / (b - a)
}

/** The mean of t³ over [a, b] is (a + b)(a² + b²)/4. */
function cubicMean(cell: MeanCell): void {
  const a = cell[0]!
  const b = cell[1]!
  const end = Math.min(b, 1.5)
  const curved = (a + end) / 2 - ((a + end) * (a * a + end * end)) / 27
  if (b <= 1.5) cell[2] = curved
  else cell[2] = a >= 1.5 ? 1 : ((1.5 - a) * curved + (b - 1.5)) / (b - a)
}

function deadZoneMean({ deadZone }: CurveParameters, cell: MeanCell): void {
  const a = cell[0]!
  const b = cell[1]!
  const over = Math.max(0, b - deadZone)
  if (a >= deadZone) cell[2] = (a - deadZone + over) / 2
  else cell[2] = over === 0 ? 0 : (over * over) / (2 * (b - a))
}

function drawnMean(p: CurveParameters, cell: MeanCell): void {
  const width = cell[1]! - cell[0]!
  // A width of a few last places is a point, and dividing by it would be noise.
  if (width <= 1e-14 * cell[1]!) {
    cell[2] = cell[1]!
    applyCurve(p, cell, 2, 1)
    return
  }
  cell[3] = cell[0]!
  cell[4] = cell[1]!
  drawnIntegral(p.points, cell, 3)
  cell[2] = cell[3]! / width
}

/** Simpson's rule where a difference of antiderivatives would lose more digits than the rule does. */
function smoothMean(p: CurveParameters, cell: MeanCell): void {
  const a = cell[0]!
  const b = cell[1]!
  cell[3] = a
  cell[4] = b
  if (b - a < 1e-3 * (1 + a)) {
    cell[5] = (a + b) / 2
    applyCurve(p, cell, 3, 3)
    cell[2] = (cell[3]! + 4 * cell[5]! + cell[4]!) / 6
    return
  }
  if (p.curve === 'arctan') {
    arctanIntegrals(cell, 3, 2)
  } else if (p.curve === 'tanh') {
    tanhIntegrals(cell, 3, 2)
  } else {
    diodeVoltages(cell, 3, 2)
    diodeIntegrals(cell, 3, 2)
  }
  cell[2] = (cell[4]! - cell[3]!) / (b - a)
}
