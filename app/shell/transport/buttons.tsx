// Play, bypass, equal loudness, mute: buttons name the act, toggles show on and off by fill and word.
import { toggleBypass, toggleEqualLoudness, toggleMute, togglePlay } from '../../audio/audition.ts'
import { useSession } from '../../state/session.ts'
import { BYPASS_MODES, signed } from './words.ts'

/** "Play" and "Pause" take the same room, so that nothing moves. */
export function PlayButton() {
  const playing = useSession((s) => s.playing)
  const failed = useSession((s) => s.status === 'failed')
  const sounds = playing && !failed
  return (
    <button type="button" className="cw-button cw-button--now cw-play" onClick={togglePlay}>
      <span className="cw-same-room" data-other="Pause">
        {sounds ? 'Pause' : 'Play'}
      </span>
    </button>
  )
}

export function BypassButton() {
  const bypass = useSession((s) => s.bypass)
  const mode = useSession((s) => s.bypassMode)
  const about = BYPASS_MODES.find(({ value }) => value === mode)?.about
  return (
    <button type="button" className="cw-button" aria-pressed={bypass !== 'off'} title={about} onClick={toggleBypass}>
      {mode === 'wetOnly' ? 'Wet only' : 'Bypass'}
    </button>
  )
}

export function EqualLoudnessButton() {
  const on = useSession((s) => s.equalLoudness)
  const db = useSession((s) => s.equalDb)
  const title =
    on && db !== null ? `The effect is heard ${signed(db, 1)} dB, as loud as bypassed` : 'Hear the effect as loud as the bypassed sound'
  return (
    <button type="button" className="cw-button" aria-pressed={on} title={title} onClick={toggleEqualLoudness}>
      Equal loudness
    </button>
  )
}

export function MuteButton() {
  const muted = useSession((s) => s.muted)
  return (
    <button type="button" className="cw-button cw-mute" aria-pressed={muted} onClick={toggleMute}>
      <span className="cw-same-room" data-other="Muted">
        {muted ? 'Muted' : 'Mute'}
      </span>
    </button>
  )
}
