// The checks that take long, for any set: with what judges a panel.
import { panelBoxSteps } from '../../../src/checks/panelBox.ts'
import { longChecksWith } from './longChecks.ts'

export const longChecksJob = longChecksWith(function* ({ set }) {
  const steps = panelBoxSteps(set)
  let step = steps.next()
  for (; !step.done; step = steps.next()) yield (step.value.done + step.value.part) / step.value.total
  return step.value
})
