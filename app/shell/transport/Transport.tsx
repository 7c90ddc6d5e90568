// What is heard: the right half of the top bar, and the bottom bar of a narrow page.
import './transport.css'
import './source.css'
import { useEffect } from 'react'
import { loadWrapper } from '../../audio/wrapper.ts'
import { useSession } from '../../state/session.ts'
import { AudioNotices } from './AudioNotices.tsx'
import { BypassButton, EqualLoudnessButton, MuteButton, PlayButton } from './buttons.tsx'
import { Caution, loadCaution } from './Caution.tsx'
import { LevelControl } from './LevelControl.tsx'
import { ListeningMenu } from './ListeningMenu.tsx'
import { MeterPair } from './MeterPair.tsx'
import { SourcePanel } from './SourcePanel.tsx'

export function Transport() {
  return (
    <Sound>
      <SourcePanel />
      <PlayButton />
      <BypassGroup />
      <EqualLoudnessButton />
      <LevelControl />
      <MeterPair />
      <MuteButton />
    </Sound>
  )
}

export function TransportNarrow() {
  return (
    <Sound narrow>
      <PlayButton />
      <SourcePanel>
        <div className="cw-source-listening">
          <BypassGroup />
          <EqualLoudnessButton />
          <MeterPair />
        </div>
      </SourcePanel>
      <LevelControl />
      <MuteButton />
    </Sound>
  )
}

interface SoundProps {
  readonly narrow?: boolean
  readonly children: React.ReactNode
}

/** What sound needs comes when a hand or the focus is near, at the latest with the first press or key anywhere: not with the page itself. */
function Sound({ narrow = false, children }: SoundProps) {
  useEffect(() => {
    const done = new AbortController()
    for (const sign of ['pointerdown', 'keydown']) addEventListener(sign, fetchSound, { capture: true, once: true, signal: done.signal })
    return () => done.abort()
  }, [])
  return (
    <section
      className={narrow ? 'cw-transport cw-transport--narrow' : 'cw-transport'}
      aria-label="Sound"
      onPointerEnter={fetchSound}
      onFocus={fetchSound}
    >
      {children}
      <Caution />
      <AudioNotices />
    </section>
  )
}

function fetchSound(): void {
  void loadWrapper().catch(() => {})
  if (!useSession.getState().cautionRead) void loadCaution().catch(() => {})
}

const BypassGroup = () => (
  <span className="cw-joined">
    <BypassButton />
    <ListeningMenu />
  </span>
)
