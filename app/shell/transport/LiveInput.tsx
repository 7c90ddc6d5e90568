// Live input: which device, and the word before it is heard. The browser's voice processing is off.
import { chooseSource, confirmHeadphones } from '../../audio/audition.ts'
import { useSession } from '../../state/session.ts'

export function LiveInput() {
  const source = useSession((s) => s.source)
  const devices = useSession((s) => s.devices)
  const headphones = useSession((s) => s.headphones)
  if (source.kind !== 'live') return null
  return (
    <div className="cw-live">
      <label className="cw-live-device">
        <span className="cw-quiet">Device</span>
        <select
          className="cw-select"
          value={source.deviceId}
          onChange={(event) => void chooseSource({ kind: 'live', deviceId: event.currentTarget.value, label: '' })}
        >
          {devices.every(({ deviceId }) => deviceId !== source.deviceId) && <option value={source.deviceId}>{source.label}</option>}
          {devices.map(({ deviceId, label }) => (
            <option key={deviceId} value={deviceId}>
              {label}
            </option>
          ))}
        </select>
      </label>
      <button type="button" className="cw-button" aria-pressed={headphones} onClick={() => confirmHeadphones(!headphones)}>
        I wear headphones
      </button>
      <p className="cw-quiet">
        {headphones ? 'Live input is heard.' : 'Live input stays silent until you say so: through loudspeakers it would howl.'} Echo
        cancellation, noise suppression and gain control are off.
      </p>
    </div>
  )
}
