// What is seldom changed: what bypass means, how delays change, where the sound goes.
import { Menu } from '@base-ui/react/menu'
import { chooseOutput, setBypassMode, setDelayChange } from '../../audio/audition.ts'
import { canChooseOutput } from '../../audio/nativeContext.ts'
import { type Bypass, type DelayChange, useSession } from '../../state/session.ts'
import { useOpenedTrigger } from '../usePopup.ts'
import { BYPASS_MODES, DELAY_CHANGES } from './words.ts'

export function ListeningPopup({ button }: { readonly button: React.ReactElement }) {
  const trigger = useOpenedTrigger()
  return (
    <Menu.Root modal={false}>
      <Menu.Trigger ref={trigger} render={button} />
      <Menu.Portal>
        <Menu.Positioner className="cw-menu-positioner" align="start" sideOffset={6} collisionPadding={8}>
          <Menu.Popup className="cw-menu">
            <Choices
              label="Bypass means"
              options={BYPASS_MODES}
              value={useSession((s) => s.bypassMode)}
              onChoose={(value) => setBypassMode(value as Exclude<Bypass, 'off'>)}
            />
            <Menu.Separator className="cw-menu-separator" />
            <Choices
              label="A changed delay"
              options={DELAY_CHANGES}
              value={useSession((s) => s.delayChange)}
              onChoose={(value) => setDelayChange(value as DelayChange)}
            />
            <Outputs />
          </Menu.Popup>
        </Menu.Positioner>
      </Menu.Portal>
    </Menu.Root>
  )
}

function Outputs() {
  const outputs = useSession((s) => s.outputs)
  const outputId = useSession((s) => s.outputId)
  if (!canChooseOutput() || outputs.length < 2) return null
  const options = [
    { value: '', label: 'As the system', about: '' },
    ...outputs.filter(({ deviceId }) => deviceId !== 'default').map(({ deviceId, label }) => ({ value: deviceId, label, about: '' })),
  ]
  return (
    <>
      <Menu.Separator className="cw-menu-separator" />
      <Choices label="Output" options={options} value={outputId} onChoose={(value) => void chooseOutput(value)} />
    </>
  )
}

interface ChoicesProps {
  readonly label: string
  readonly options: readonly { readonly value: string; readonly label: string; readonly about: string }[]
  readonly value: string
  readonly onChoose: (value: string) => void
}

function Choices({ label, options, value: chosen, onChoose }: ChoicesProps) {
  return (
    <Menu.RadioGroup value={chosen} onValueChange={(value) => onChoose(value as string)}>
      <Menu.GroupLabel className="cw-menu-label">{label}</Menu.GroupLabel>
      {options.map(({ value, label: name, about }) => (
        <Menu.RadioItem key={value} value={value} className="cw-menu-item">
          <span className="cw-menu-two">
            <span>
              <span className="cw-menu-mark" aria-hidden="true">
                {value === chosen ? '✓' : ''}
              </span>
              {name}
            </span>
            {about && <span className="cw-menu-about cw-menu-indent">{about}</span>}
          </span>
        </Menu.RadioItem>
      ))}
    </Menu.RadioGroup>
  )
}
