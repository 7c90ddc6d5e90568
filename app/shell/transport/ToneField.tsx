// Frequency of the tone: typed as a frequency or a note, or slid.
import { useState } from 'react'
import { formatQuantity, parseQuantity } from '../../../src/set/units.ts'
import { setToneHz } from '../../audio/audition.ts'
import { TONE_MAX_HZ, TONE_MIN_HZ, useSession } from '../../state/session.ts'

const STEPS = 1000
const toStep = (hz: number) => (STEPS * Math.log(hz / TONE_MIN_HZ)) / Math.log(TONE_MAX_HZ / TONE_MIN_HZ)
const toHz = (step: number) => TONE_MIN_HZ * (TONE_MAX_HZ / TONE_MIN_HZ) ** (step / STEPS)

export function ToneField() {
  const hz = useSession((s) => s.toneHz)
  const [typed, setTyped] = useState<string | null>(null)
  const [refusal, setRefusal] = useState<string | null>(null)
  const shown = formatQuantity(hz, 'Hz')
  const text = `${shown.number} ${shown.unit}`

  function apply() {
    if (typed === null) return
    const read = parseQuantity(typed, 'Hz')
    const problem = !read.ok
      ? (read.problems[0]?.message ?? 'not a frequency')
      : read.value < TONE_MIN_HZ || read.value > TONE_MAX_HZ
        ? `a tone is ${TONE_MIN_HZ} Hz to ${TONE_MAX_HZ / 1000} kHz`
        : null
    setRefusal(problem)
    if (problem !== null || !read.ok) return
    setToneHz(read.value)
    setTyped(null)
  }

  return (
    <div className="cw-tone">
      <label className="cw-tone-number">
        <span className="cw-quiet">Frequency</span>
        <input
          type="text"
          className="cw-text"
          value={typed ?? text}
          data-edited={typed !== null}
          aria-invalid={refusal !== null}
          onChange={(event) => setTyped(event.currentTarget.value)}
          onBlur={apply}
          onKeyDown={(event) => {
            if (event.key === 'Enter') apply()
            if (event.key !== 'Escape' || typed === null) return
            event.stopPropagation()
            setTyped(null)
            setRefusal(null)
          }}
        />
      </label>
      <input
        type="range"
        className="cw-range"
        aria-label="Frequency"
        aria-valuetext={text}
        min={0}
        max={STEPS}
        step={1}
        value={toStep(hz)}
        style={{ '--share': `${(100 * toStep(hz)) / STEPS}%` } as React.CSSProperties}
        onChange={(event) => setToneHz(toHz(event.currentTarget.valueAsNumber))}
      />
      <p className="cw-quiet" role="status">
        {refusal ?? 'A frequency or a note: 440 Hz, 1.2k, A3, Bb2'}
      </p>
    </div>
  )
}
