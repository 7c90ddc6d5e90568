// A long figure as a part of a longer one: its own progress, 0 to 1, told as that of the whole.

/** Runs `steps` to its end, yielding from + part · its progress; returns what it returns. */
export function* partOf<T>(steps: Generator<number, T>, from: number, part: number): Generator<number, T> {
  for (let step = steps.next(); ; step = steps.next()) {
    if (step.done) return step.value
    yield from + part * step.value
  }
}
