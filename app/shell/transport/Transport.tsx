// What is heard: the right half of the top bar, and the bottom bar of a narrow page.
import './transport.css'
import './source.css'
import { useEffect } from 'react'
import { prepareSound } from '../../audio/wrapper.ts'
import { AudioNotices } from './AudioNotices.tsx'
import { BypassButton, EqualLoudnessButton, MuteButton, PlayButton } from './buttons.tsx'
import { Caution } from './Caution.tsx'
import { LevelControl } from './LevelControl.tsx'
import { ListeningMenu } from './ListeningMenu.tsx'
import { MeterPair } from './MeterPair.tsx'
import { SourcePanel } from './SourcePanel.tsx'

export function Transport() {
  useEffect(prepareSound, [])
  return (
    <section className="cw-transport" aria-label="Sound">
      <SourcePanel />
      <PlayButton />
      <BypassGroup />
      <EqualLoudnessButton />
      <LevelControl />
      <MeterPair />
      <MuteButton />
      <Caution />
      <AudioNotices />
    </section>
  )
}

export function TransportNarrow() {
  useEffect(prepareSound, [])
  return (
    <section className="cw-transport cw-transport--narrow" aria-label="Sound">
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
      <Caution />
      <AudioNotices />
    </section>
  )
}

const BypassGroup = () => (
  <span className="cw-joined">
    <BypassButton />
    <ListeningMenu />
  </span>
)
