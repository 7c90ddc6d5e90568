// The listening level: starts at −20 dB on every visit, belongs to no set.
import { setLevel } from '../../audio/audition.ts'
import { LEVEL_MAX_DB, LEVEL_MIN_DB, useSession } from '../../state/session.ts'
import { levelText } from './words.ts'

export function LevelControl() {
  const db = useSession((s) => s.levelDb)
  const text = levelText(db, LEVEL_MIN_DB)
  const share = (db - LEVEL_MIN_DB) / (LEVEL_MAX_DB - LEVEL_MIN_DB)
  return (
    <label className="cw-level" title="Listening level: not part of the set">
      <span className="cw-level-text">
        <span className="cw-level-label">Level</span> <span className="cw-level-value">{text}</span>
      </span>
      <input
        type="range"
        className="cw-range"
        min={LEVEL_MIN_DB}
        max={LEVEL_MAX_DB}
        step={1}
        value={db}
        aria-valuetext={text}
        style={{ '--share': `${share * 100}%` } as React.CSSProperties}
        onChange={(event) => setLevel(event.currentTarget.valueAsNumber)}
      />
    </label>
  )
}
