// Oracle: numpy.kaiser(21, beta) (computed), points 10 + k, that is u = k/10.
import { expect, it } from 'vitest'
import { kaiserWindow } from '../../src/signal/kaiser.ts'

it.each([
  [5, [1, 0.9778652640563413, 0.6902064155143299, 0.2874963818936663, 0.036710892271286676]],
  [12.265, [1, 0.9427913276562577, 0.37556151714564695, 0.03568075547210854, 4.094280566307009e-5]],
  [14.9, [1, 0.9304107293045478, 0.3013414288652248, 0.01678507757800955, 3.2427989410068423e-6]],
] as const)('the window of β = %f is numpy’s', (beta, values) => {
  const window = kaiserWindow(beta)
  // Its very edge, u = 1, counts as outside.
  for (const [i, k] of [0, 1, 4, 7].entries()) expect(Math.abs(window(k / 10) - (values[i] as number))).toBeLessThan(1e-11)
  expect(Math.abs(window(1 - 1e-12) - values[4])).toBeLessThan(1e-11)
  expect(window(1)).toBe(0)
})
