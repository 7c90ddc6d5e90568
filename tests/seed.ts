// Every property test draws the same cases on every run; fast-check prints the seed with a failure. COMBWRIGHT_SEED tries others.
import fc from 'fast-check'

fc.configureGlobal({ seed: Number(process.env.COMBWRIGHT_SEED ?? 20261201) })
