// What `new` gives is the first thing a user sees judged: nothing of it may fail, wherever its knobs stand.
import { expect, it } from 'vitest'
import { panelBoxSteps } from '../../src/checks/panelBox.ts'
import { runChecks, verdictOf } from '../../src/checks/registry.ts'
import { startingSet } from '../../src/set/intents.ts'
import type { ChoiceParameter } from '../../src/set/parameters/kinds.ts'
import { parameter } from '../../src/set/parameters.ts'
import type { Intent } from '../../src/set/types.ts'

const INTENTS = (parameter('intent') as ChoiceParameter).options.map(({ value }) => value as Intent)

it.each(INTENTS)('%s: every check holds where the knobs stand, and none fails at any knob position', (intent) => {
  const set = startingSet(intent)
  expect(verdictOf(runChecks(set))).toBe('holds')
  const steps = panelBoxSteps(set)
  let step = steps.next()
  while (!step.done) step = steps.next()
  expect(step.value.status, step.value.text).not.toBe('fails')
})
