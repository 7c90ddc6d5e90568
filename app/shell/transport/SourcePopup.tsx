// Choosing what is heard: built-in phrases, the user's recording, live input; what goes with each stands beneath.
import { Popover } from '@base-ui/react/popover'
import { useState } from 'react'
import { PHRASES } from '../../../src/material/phraseList.ts'
import { chooseAudioFile, chooseSource } from '../../audio/audition.ts'
import { ensureMaterial, TONE_ID } from '../../audio/material.ts'
import { useSession } from '../../state/session.ts'
import { useOpenedTrigger } from '../usePopup.ts'
import { LiveInput } from './LiveInput.tsx'
import { ToneField } from './ToneField.tsx'
import { Waveform } from './Waveform.tsx'
import { timeText } from './words.ts'

interface SourcePopupProps {
  readonly button: React.ReactElement
  readonly children: React.ReactNode
}

export function SourcePopup({ button, children }: SourcePopupProps) {
  const trigger = useOpenedTrigger()
  const source = useSession((s) => s.source)
  return (
    <Popover.Root onOpenChange={(open) => open && void ensureMaterial()}>
      <Popover.Trigger ref={trigger} render={button} />
      <Popover.Portal>
        <Popover.Positioner className="cw-menu-positioner" align="start" sideOffset={6} collisionPadding={8}>
          <Popover.Popup className="cw-source-panel" aria-label="Source">
            <Phrases />
            <div className="cw-source-acts">
              <button type="button" className="cw-button" onClick={() => void chooseAudioFile()}>
                Open a recording…
              </button>
              <button
                type="button"
                className="cw-button"
                aria-pressed={source.kind === 'live'}
                onClick={() => void chooseSource({ kind: 'live', deviceId: '', label: '' })}
              >
                Live input…
              </button>
            </div>
            <Loading />
            {source.kind === 'file' && (
              <FileLine name={source.name} seconds={source.seconds} channels={source.channels} rate={source.rate} remark={source.remark} />
            )}
            {source.kind === 'live' ? <LiveInput /> : source.kind === 'phrase' && source.id === TONE_ID ? <ToneField /> : <Waveform />}
            {children}
          </Popover.Popup>
        </Popover.Positioner>
      </Popover.Portal>
    </Popover.Root>
  )
}

function Phrases() {
  const chosen = useSession((s) => (s.source.kind === 'phrase' ? s.source.id : null))
  // Shown at once; the sound follows when it has been made.
  const [wanted, setWanted] = useState<string | null>(null)
  async function choose(id: string) {
    setWanted(id)
    await chooseSource({ kind: 'phrase', id })
    setWanted((now) => (now === id ? null : now))
  }
  return (
    <fieldset className="cw-choices">
      <legend className="cw-quiet">Built-in phrases</legend>
      {PHRASES.map(({ id, label, about }) => (
        <label key={id} className="cw-choice" title={about}>
          <input type="radio" name="cw-phrase" value={id} checked={(wanted ?? chosen) === id} onChange={() => void choose(id)} />
          {label}
        </label>
      ))}
    </fieldset>
  )
}

function Loading() {
  const loading = useSession((s) => s.loading)
  return (
    <p className="cw-source-loading" role="status">
      {loading}
    </p>
  )
}

interface FileLineProps {
  readonly name: string
  readonly seconds: number
  readonly channels: number
  readonly rate: number
  readonly remark: string
}

const FileLine = ({ name, seconds, channels, rate, remark }: FileLineProps) => (
  <p className="cw-source-file">
    <span className="cw-source-file-name">{name}</span>
    <span className="cw-quiet">
      {' '}
      {timeText(seconds)} · {channels === 1 ? 'mono' : channels === 2 ? 'stereo' : `${channels} channels`} · {rate / 1000} kHz · {remark}
    </span>
  </p>
)
